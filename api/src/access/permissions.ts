/** Who may do what, in one place. Whatever is not listed is denied. */
export const roles = ['owner', 'designer', 'crew'] as const;
export type Role = (typeof roles)[number];

const everyone: readonly Role[] = ['owner', 'designer', 'crew'];
const planners: readonly Role[] = ['owner', 'designer'];
const owners: readonly Role[] = ['owner'];

export const permissions = {
  'company.read': everyone,
  'company.edit': owners,
  'company.export': owners,
  'company.delete': owners,
  'members.read': everyone,
  'members.edit': owners,
  'clients.read': everyone,
  'clients.edit': planners,
  'jobs.read': everyone,
  'jobs.edit': planners,
  /** The site-walk form and photos are filled in by whoever is on site. */
  'jobs.survey': everyone,
  'sheets.read': everyone,
  'sheets.edit': planners,
  'plan.read': everyone,
  'plan.edit': planners,
  'catalogue.read': everyone,
  'catalogue.edit': planners,
  'estimates.run': everyone,
  /** Prices of items and jobs. Costs and margins only where the company lets designers see them. */
  'prices.read': planners,
  'prices.edit': planners,
  /** The price book: rates, overhead, markup, taxes, stages. */
  'price-book.edit': owners,
  'proposals.read': planners,
  'proposals.edit': planners,
  'questions.answer': planners,
  'payments.read': planners,
  'payments.record': planners,
  'payments.refund': owners,
  'payments.export': owners,
  'timeline.read': everyone,
  'board.read': everyone,
  'numbers.read': owners,
} as const satisfies Record<string, readonly Role[]>;

export type Permission = keyof typeof permissions;

export const allows = (role: Role, permission: Permission): boolean =>
  (permissions[permission] as readonly Role[]).includes(role);
