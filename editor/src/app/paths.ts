/** Every address of the product, once. Patterns for the router; `to` fills them in for links. */
export const paths = {
  home: '/',
  signIn: '/sign-in',
  signUp: '/sign-up',
  forgotPassword: '/forgot-password',
  resetPassword: '/reset-password',
  confirmEmail: '/confirm-email',
  invitation: '/invitation',
  jobs: '/jobs',
  newJob: '/jobs/new',
  job: '/jobs/:jobId',
  siteWalk: '/jobs/:jobId/site-walk',
  plan: '/jobs/:jobId/plan',
  proposal: '/jobs/:jobId/proposal',
  board: '/board',
  numbers: '/numbers',
  price: '/jobs/:jobId/price',
  clients: '/clients',
  client: '/clients/:clientId',
  catalogue: '/catalogue',
  newCatalogueItem: '/catalogue/new/:category',
  catalogueItem: '/catalogue/items/:itemId',
  catalogueImport: '/catalogue/import',
  company: '/company',
  people: '/company/people',
  proposalTexts: '/company/proposals',
  priceBook: '/company/prices',
  account: '/account',
} as const;

const segment = encodeURIComponent;

export const to = {
  job: (jobId: string) => `/jobs/${segment(jobId)}`,
  siteWalk: (jobId: string) => `/jobs/${segment(jobId)}/site-walk`,
  /** The plan page, on a given sheet when one is named. */
  plan: (jobId: string, sheetId?: string) =>
    `/jobs/${segment(jobId)}/plan${sheetId === undefined ? '' : `?sheet=${segment(sheetId)}`}`,
  /** The plan page with some of its records chosen. Many of them would be too long for a server to be sent. */
  planLit: (jobId: string, recordIds: readonly string[]) =>
    `/jobs/${segment(jobId)}/plan${recordIds.length > 100 ? '#' : '?'}lit=${recordIds.map(segment).join(',')}`,
  /** The price of a job, at a part of it when one is named. */
  price: (jobId: string, part?: string) =>
    `/jobs/${segment(jobId)}/price${part === undefined ? '' : `?part=${segment(part)}`}`,
  proposal: (jobId: string) => `/jobs/${segment(jobId)}/proposal`,
  newJobFor: (clientId: string) => `/jobs/new?client=${segment(clientId)}`,
  client: (clientId: string) => `/clients/${segment(clientId)}`,
  newCatalogueItem: (category: string) => `/catalogue/new/${segment(category)}`,
  catalogueItem: (itemId: string) => `/catalogue/items/${segment(itemId)}`,
  /** Sign-in that returns to where the person was. */
  signIn: (back: string) => (back === '/' ? '/sign-in' : `/sign-in?to=${segment(back)}`),
} as const;
