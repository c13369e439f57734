import { z } from 'zod';
import { answerSchema } from '../../lib/site-walk';

/**
 * What somebody has typed on site and not sent yet, kept in this browser: opening the camera may kill the
 * tab, and the garden may have no signal. Kept per person and job, and gone once the server has it.
 */
const text = z.string();
const presence = z.object({ present: answerSchema, note: text });
/** As typed: numbers may be half-written, so nothing but the shape is checked here. */
export const siteWalkDraftSchema = z.object({
  lineVoltsUnderLoad: z.number().nullable(),
  outletLocation: text,
  circuitRatingAmps: z.number().nullable(),
  otherLoadsOnCircuit: text,
  protected: answerSchema,
  existingTransformer: text,
  existingCable: text,
  irrigation: presence,
  gas: presence,
  petFence: presence,
  associationRules: text,
  permits: text,
  notes: text,
});
export type SiteWalkDraft = z.infer<typeof siteWalkDraftSchema>;

export const emptySiteWalk: SiteWalkDraft = {
  lineVoltsUnderLoad: null,
  outletLocation: '',
  circuitRatingAmps: null,
  otherLoadsOnCircuit: '',
  protected: 'unknown',
  existingTransformer: '',
  existingCable: '',
  irrigation: { present: 'unknown', note: '' },
  gas: { present: 'unknown', note: '' },
  petFence: { present: 'unknown', note: '' },
  associationRules: '',
  permits: '',
  notes: '',
};

const stored = z.object({ at: z.string(), draft: siteWalkDraftSchema });
export type StoredDraft = z.infer<typeof stored>;

const keyOf = (userId: string, jobId: string) => `lampwright.site-walk.${userId}.${jobId}`;

/** The part of Web Storage that is used. */
export type DraftStorage = Pick<Storage, 'getItem' | 'setItem' | 'removeItem'>;

export function readDraft(storage: DraftStorage, userId: string, jobId: string): StoredDraft | null {
  const found = storage.getItem(keyOf(userId, jobId));
  if (found === null) return null;
  try {
    const parsed = stored.safeParse(JSON.parse(found));
    return parsed.success ? parsed.data : null;
  } catch {
    return null;
  }
}

/** False when the browser refuses (storage full or turned off): the person is told, as nothing then survives a reload. */
export function keepDraft(
  storage: DraftStorage,
  userId: string,
  jobId: string,
  draft: SiteWalkDraft,
  at: Date,
): boolean {
  try {
    // NaN (no number yet) has no place in JSON and would come back as null by itself; say it on purpose.
    const clean = JSON.stringify({ at: at.toISOString(), draft }, (_key, value) =>
      Number.isNaN(value) ? null : value,
    );
    storage.setItem(keyOf(userId, jobId), clean);
    return true;
  } catch {
    return false;
  }
}

export function dropDraft(storage: DraftStorage, userId: string, jobId: string): void {
  storage.removeItem(keyOf(userId, jobId));
}
