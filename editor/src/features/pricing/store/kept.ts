import { type JobPricing, jobPricingSchema } from '@lampwright/geometry/price';
import { z } from 'zod';

/** Edits that the server has not got yet, as they are kept in the browser. */
export interface Kept {
  readonly baseVersion: number;
  readonly base: JobPricing;
  readonly mine: JobPricing;
  readonly unsent: number;
}

const keptSchema = z.object({
  baseVersion: z.number().int().min(0),
  base: jobPricingSchema,
  mine: jobPricingSchema,
  unsent: z.number().int().min(1),
});

export interface Owner {
  readonly userId: string;
  readonly companyId: string;
  readonly jobId: string;
}

/** Keeps unsent edits through a reload, apart for each person, company and job. */
export interface Keeper {
  read(): Kept | null;
  write(kept: Kept | null): void;
}

export function localKeeper({ userId, companyId, jobId }: Owner, storage: Storage | null): Keeper {
  const key = `lampwright.pricing.${userId}.${companyId}.${jobId}`;
  return {
    read() {
      const parsed = keptSchema.safeParse(jsonOf(storage?.getItem(key) ?? null));
      return parsed.success ? parsed.data : null;
    },
    write(kept) {
      try {
        if (kept === null) storage?.removeItem(key);
        else storage?.setItem(key, JSON.stringify(kept));
      } catch {
        // A full or forbidden storage keeps nothing; the edits are still in this window and on their way.
      }
    },
  };
}

function jsonOf(text: string | null): unknown {
  try {
    return text === null ? null : JSON.parse(text);
  } catch {
    return null;
  }
}
