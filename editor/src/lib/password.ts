import { z } from 'zod';

/** A password being chosen. Its length is what makes it hard to guess; there are no rules about kinds of characters. */
export const newPasswordSchema = z
  .string()
  .min(10, { error: 'At least 10 characters. A few unrelated words are easy to remember.' })
  .max(200);
