import { picturesOf } from './proposal-store.js';
import type { RevisionRow } from './proposals.repository.js';
import type { RevisionDocument } from './revision-document.js';

type ShownSheet = RevisionDocument['sheets'][number];

/** A revision's pictures come in two sizes: for paper and a close look, and for a first look on a phone. */
export const PICTURE = { edgePx: 1600, bytes: 250_000 } as const;
export const LIGHT_PICTURE = { edgePx: 1000, bytes: 120_000 } as const;

const besideOf = (key: string, what: string): string => key.replace(/(\.\w+)?$/, `-${what}$1`);

/** Where the light one of a picture is stored. Revisions made before there were any have none. */
export const lightKeyOf = (key: string): string => besideOf(key, String(LIGHT_PICTURE.edgePx));

/**
 * Where the same garden by night is stored: full dark, with the lights of the offered groups on. Sheets without a
 * scale or a lit light have none, nor have revisions made before there were any.
 */
export const nightKeyOf = (key: string): string => besideOf(key, 'night');

/**
 * The sheets that have a picture. The one to be seen first leads: the photo with the most lights, or a drawing
 * where no photo has any.
 */
export function picturedSheets(
  row: Pick<RevisionRow, 'pictures'>,
  { sheets, lights }: Pick<RevisionDocument, 'sheets' | 'lights'>,
): ShownSheet[] {
  const kept = picturesOf(row);
  const pictured = sheets.filter(({ id }) => kept.has(id));
  const worth = ({ id, view }: ShownSheet): readonly [number, number] => {
    const count = lights.filter(({ sheetId }) => sheetId === id).length;
    return [count > 0 && view === 'photo' ? 1 : 0, count];
  };
  const better = (a: ShownSheet, b: ShownSheet): boolean => {
    const [[aPhoto, aLights], [bPhoto, bLights]] = [worth(a), worth(b)];
    return aPhoto === bPhoto ? aLights > bLights : aPhoto > bPhoto;
  };
  const [start, ...others] = pictured;
  if (!start) return [];
  const first = others.reduce((best, sheet) => (better(sheet, best) ? sheet : best), start);
  return [first, ...pictured.filter((sheet) => sheet !== first)];
}
