import { z } from 'zod';

/** Fields that several forms about people share. */

/** One line of text as people type it: no control characters, which could forge lines in a letter. */
export const lineOfText = (most: number, missing: string) =>
  z
    .string()
    .trim()
    .min(1, { error: missing })
    .max(most, { error: `Please use at most ${most} characters.` })
    .regex(/^[^\p{Cc}\u2028\u2029]*$/u, { error: 'Please use one line of plain text.' });

export const personName = lineOfText(120, 'Please enter a name.');

/** Trimmed and in lower case, as it is stored and compared. */
export const emailAddress = z
  .string()
  .trim()
  .toLowerCase()
  .max(254, { error: 'This address is too long.' })
  .pipe(z.email({ error: 'Please enter an e-mail address, such as name@example.com.' }));

export const PASSWORD_LENGTH = { least: 10, most: 200 } as const;

/** A password being chosen. */
export const newPassword = z
  .string()
  .min(PASSWORD_LENGTH.least, { error: `Please use at least ${PASSWORD_LENGTH.least} characters.` })
  .max(PASSWORD_LENGTH.most, { error: `Please use at most ${PASSWORD_LENGTH.most} characters.` });

/** A password given to be checked: whatever its length, it is right or wrong. */
export const givenPassword = z
  .string()
  .min(1, { error: 'Please enter your password.' })
  .max(PASSWORD_LENGTH.most, { error: `Please use at most ${PASSWORD_LENGTH.most} characters.` });

/** The secret of a link; anything else is refused before it is looked up. */
export const linkToken = z.string().min(1).max(200);
