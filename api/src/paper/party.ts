import type { z } from 'zod';
import type { partySchema } from '../modules/proposals/revision-document.js';

export type Party = z.infer<typeof partySchema>;

/** Lines under a party's name; what is not known takes none. */
export const partyLines = ({ address, phone, email }: Party): string[] =>
  [address, phone, email].map((line) => line.trim()).filter((line) => line !== '');
