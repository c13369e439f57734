import { expect, it } from 'vitest';
import { lightKeyOf, picturedSheets } from './pictures.js';
import type { RevisionDocument } from './revision-document.js';

type Sheet = RevisionDocument['sheets'][number];
type Light = RevisionDocument['lights'][number];

const sheet = (id: string, view: Sheet['view']): Sheet => ({ id, name: id, view, widthPx: 10, heightPx: 10 });

/** Which sheets are pictured, in order; each has so many lights. */
function order(
  sheets: readonly [string, Sheet['view'], number][],
  kept = sheets.map(([id]) => id),
): string[] {
  const lights = sheets.flatMap(([id, , count]) =>
    Array.from({ length: count }, () => ({ sheetId: id }) as Light),
  );
  const row = { pictures: Object.fromEntries(kept.map((id) => [id, `${id}.jpg`])) };
  const shown = picturedSheets(row, { sheets: sheets.map(([id, view]) => sheet(id, view)), lights });
  return shown.map(({ id }) => id);
}

it('puts the photo with the most lights first, and leaves the others as they are', () => {
  expect(
    order([
      ['plot', 'plan', 40],
      ['front', 'photo', 3],
      ['back', 'photo', 5],
    ]),
  ).toEqual(['back', 'plot', 'front']);
});

it('puts a drawing first only where no photo has a light', () => {
  expect(
    order([
      ['front', 'photo', 0],
      ['plot', 'plan', 2],
    ]),
  ).toEqual(['plot', 'front']);
});

it('keeps the order of equals, and knows only sheets that have a picture', () => {
  const sheets: [string, Sheet['view'], number][] = [
    ['a', 'photo', 2],
    ['b', 'photo', 2],
    ['c', 'photo', 9],
  ];
  expect(order(sheets, ['a', 'b'])).toEqual(['a', 'b']);
  expect(order(sheets, [])).toEqual([]);
});

it('stores the light picture beside the other', () => {
  expect(lightKeyOf('c/proposals/r/sheet-s.jpg')).toBe('c/proposals/r/sheet-s-1000.jpg');
});
