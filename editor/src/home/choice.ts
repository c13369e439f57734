import type { Combination, Group, ShareDocument } from './share';

type Price = Pick<ShareDocument['price'], 'combinations' | 'groups'>;

/** The groups that the homeowner takes. The base is not among them: it is always in. */
export type Choice = ReadonlySet<string>;

export const switchable = ({ groups }: Pick<Price, 'groups'>): readonly (Group & { id: string })[] =>
  groups.filter((group): group is Group & { id: string } => group.id !== null);

/** The sums of exactly these groups; undefined where the company has not worked them out. */
export const combinationOf = ({ combinations }: Pick<Price, 'combinations'>, choice: Choice) =>
  combinations.find(({ groups }) => groups.length === choice.size && groups.every((id) => choice.has(id)));

/** The combination to begin with: the one that is offered, or else the first that can be. */
export const offered = ({ combinations }: Pick<Price, 'combinations'>): Combination | undefined =>
  combinations.find(({ offerable }) => offerable) ?? combinations[0];

export type Switched =
  | { readonly kind: 'taken'; readonly choice: Choice }
  | {
      readonly kind: 'refused';
      /** In plain words. */
      readonly reason: string;
      /** The nearest choice with this group switched as it was meant, if any can be had. */
      readonly instead: Choice | null;
    };

/** Switches one group; a combination that cannot be had is refused, and the choice stays as it was. */
export function switched(price: Price, choice: Choice, groupId: string): Switched {
  const wanted = new Set(choice);
  if (!wanted.delete(groupId)) wanted.add(groupId);
  const combination = combinationOf(price, wanted);
  if (combination?.offerable) return { kind: 'taken', choice: wanted };
  return {
    kind: 'refused',
    reason: combination?.reason || 'These parts cannot be had together as they are planned.',
    instead: nearest(price, wanted, groupId),
  };
}

function nearest({ combinations }: Price, wanted: Choice, fixed: string): Choice | null {
  const far = (groups: readonly string[]): number => {
    const other = new Set(groups);
    return [...wanted].filter((id) => !other.has(id)).length + groups.filter((id) => !wanted.has(id)).length;
  };
  const [best] = combinations
    .filter(({ offerable, groups }) => offerable && groups.includes(fixed) === wanted.has(fixed))
    .sort((a, b) => far(a.groups) - far(b.groups));
  return best ? new Set(best.groups) : null;
}
