import { hash, verify } from '@node-rs/argon2';

/**
 * Argon2id with 19 MiB, two passes, one lane: the least that OWASP's password storage cheat sheet asks for.
 * Named here although they are the library's defaults, so that an update can't weaken them unseen.
 */
const COST = { memoryCost: 19_456, timeCost: 2, parallelism: 1 } as const;

export const hashPassword = (password: string): Promise<string> => hash(password, COST);

let decoy: Promise<string> | undefined;

/**
 * Whether the password is the one behind the hash. Without a hash (nobody by that name, or a person without a
 * password) the same work is done against a decoy, so that the time taken tells nothing.
 */
export async function verifyPassword(storedHash: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword('nobody has this password');
  const matches = await verify(storedHash ?? (await decoy), password);
  return matches && storedHash !== null;
}
