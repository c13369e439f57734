import { z } from 'zod';

const part = z.enum(['ok', 'failing']);
export const healthSchema = z.strictObject({
  status: part,
  database: part,
  storage: part,
  queue: part,
});
export type Health = z.infer<typeof healthSchema>;
