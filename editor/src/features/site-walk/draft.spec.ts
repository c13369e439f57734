import { expect, it } from 'vitest';
import { type DraftStorage, dropDraft, emptySiteWalk, keepDraft, readDraft } from './draft';

function storage(): DraftStorage & { readonly kept: Map<string, string> } {
  const kept = new Map<string, string>();
  return {
    kept,
    getItem: (key) => kept.get(key) ?? null,
    setItem: (key, value) => void kept.set(key, value),
    removeItem: (key) => void kept.delete(key),
  };
}
const at = new Date('2026-12-01T14:02:00Z');
const typed = { ...emptySiteWalk, outletLocation: 'Patio wall', lineVoltsUnderLoad: 118.5 };

it('brings back what was typed, and when', () => {
  const local = storage();
  expect(keepDraft(local, 'u', 'j', typed, at)).toBe(true);
  expect(readDraft(local, 'u', 'j')).toEqual({ at: at.toISOString(), draft: typed });
});

it('keeps the drafts of people and jobs apart', () => {
  const local = storage();
  keepDraft(local, 'u', 'j', typed, at);
  expect(readDraft(local, 'other', 'j')).toBeNull();
  expect(readDraft(local, 'u', 'other')).toBeNull();
});

it('keeps a number that is half-written as none', () => {
  const local = storage();
  keepDraft(local, 'u', 'j', { ...typed, circuitRatingAmps: Number.NaN }, at);
  expect(readDraft(local, 'u', 'j')?.draft.circuitRatingAmps).toBeNull();
});

it('forgets a draft that was sent', () => {
  const local = storage();
  keepDraft(local, 'u', 'j', typed, at);
  dropDraft(local, 'u', 'j');
  expect(readDraft(local, 'u', 'j')).toBeNull();
});

it('passes over what it cannot read', () => {
  const local = storage();
  keepDraft(local, 'u', 'j', typed, at);
  const [key] = local.kept.keys();
  for (const broken of ['{', '{"at":"x"}', 'null', JSON.stringify({ at: 'x', draft: { notes: 1 } })]) {
    local.kept.set(key ?? '', broken);
    expect(readDraft(local, 'u', 'j')).toBeNull();
  }
});

it('says when the browser keeps nothing', () => {
  const full: DraftStorage = {
    ...storage(),
    setItem: () => {
      throw new DOMException('The quota is used up.', 'QuotaExceededError');
    },
  };
  expect(keepDraft(full, 'u', 'j', typed, at)).toBe(false);
});
