import { ApiProblem, sentenceOf } from '../../lib/api/client';

export interface Sorted {
  /** Faults that belong to a field, by its dotted path. */
  readonly fields: readonly { readonly name: string; readonly message: string }[];
  /** What is left to say above the button; null when the fields say it all. */
  readonly rest: string | null;
}

/** JSON pointer (RFC 6901) to the dotted path that the form knows a field by. */
export const pointerToName = (pointer: string): string =>
  pointer
    .replace(/^#?\//, '')
    .split('/')
    .map((part) => part.replaceAll('~1', '/').replaceAll('~0', '~'))
    .join('.');

/** Gives each fault to its field, and what fits no field of this form to the form as a whole. */
export function sortErrors(
  error: unknown,
  isField: (name: string) => boolean,
  fieldOf: (name: string) => string = (name) => name,
): Sorted {
  if (!(error instanceof ApiProblem) || error.errors.length === 0)
    return { fields: [], rest: sentenceOf(error) };
  const faults = error.errors.map((fault) => {
    return { name: fieldOf(pointerToName(fault.pointer)), message: fault.detail };
  });
  const fields = faults.filter((fault) => isField(fault.name));
  const others = faults.filter((fault) => !isField(fault.name));
  return {
    fields,
    rest: others.length === 0 ? null : others.map((fault) => fault.message).join(' '),
  };
}
