import canonicalize from 'canonicalize';

/** The package's types claim a default export beside the function that it is. */
const serialize = canonicalize as unknown as (value: unknown) => string | undefined;

/** JSON in its one canonical form (RFC 8785): the same value is the same text, however its keys are ordered. */
export function canonicalJson(value: unknown): string {
  const text = serialize(value);
  if (text === undefined) throw new Error('There is no JSON for this value.');
  return text;
}
