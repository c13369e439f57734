import { expect, it } from 'vitest';
import { isHeic } from './heic';

const box = (brand: string) => new Blob([new Uint8Array([0, 0, 0, 24]), `ftyp${brand}`, new Uint8Array(12)]);

it.each(['heic', 'heix', 'mif1', 'msf1', 'hevc'])('knows a photo of brand %s by its bytes', async (brand) => {
  expect(await isHeic(box(brand))).toBe(true);
});

it('takes nothing else for one', async () => {
  expect(await isHeic(box('avif'))).toBe(false);
  expect(await isHeic(box('mp42'))).toBe(false);
  expect(await isHeic(new Blob([new Uint8Array([0xff, 0xd8, 0xff, 0xe0])]))).toBe(false);
  expect(await isHeic(new Blob([]))).toBe(false);
});
