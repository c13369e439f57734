import type { Locator } from '@playwright/test';
import sharp from 'sharp';
import type { Point } from './plan-handle.js';

/** The yard photo that sheets of these tests show whole. */
const PHOTO = { width: 2400, height: 1600 } as const;

/** What a person sees at a place of the yard photo: red, green and blue, each the mean over a few pixels. */
export interface Seen {
  readonly red: number;
  readonly green: number;
  readonly blue: number;
  /** Of all three, 0 to 255. */
  readonly light: number;
}

/** Looks at places of the photo in a picture that shows all of it. */
export async function seenAt(picture: Locator, ...places: readonly Point[]): Promise<Seen[]> {
  const { data, info } = await sharp(await picture.screenshot())
    .removeAlpha()
    .raw()
    .toBuffer({ resolveWithObject: true });
  return places.map((place) => {
    const sums = [0, 0, 0];
    let count = 0;
    const x = Math.round((place.x / PHOTO.width) * info.width);
    const y = Math.round((place.y / PHOTO.height) * info.height);
    for (let dy = -3; dy <= 3; dy++)
      for (let dx = -3; dx <= 3; dx++) {
        const at = ((y + dy) * info.width + x + dx) * info.channels;
        for (const k of [0, 1, 2]) sums[k]! += data[at + k]!;
        count += 1;
      }
    const [red, green, blue] = sums.map((sum) => sum / count) as [number, number, number];
    return { red, green, blue, light: (red + green + blue) / 3 };
  });
}

/** As `seenAt`, once the picture has stopped changing: what was asked of it may take a moment to be drawn. */
export async function seenAtRest(picture: Locator, ...places: readonly Point[]): Promise<Seen[]> {
  let before: Seen[] = [];
  for (let tries = 0; tries < 40; tries++) {
    const now = await seenAt(picture, ...places);
    if (now.every(({ light }, i) => Math.abs(light - (before[i]?.light ?? -10)) < 0.5)) return now;
    before = now;
    await picture.page().waitForTimeout(250);
  }
  throw new Error('The picture did not come to rest within ten seconds.');
}
