import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import sharp from 'sharp';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { DecodeAborted, Decoder } from './decoder.js';
import {
  flatPng,
  lockedPdf,
  noisePhoto,
  PHONE_DESCRIPTION,
  pdf,
  phonePhoto,
  quarters,
} from './files.testkit.js';
import { buildDecodingChild } from './media.testkit.js';
import type { DecodeRefusal } from './task.js';

const GIGABYTE = 1e9;

describe('the decoding child', () => {
  const decoder = new Decoder();
  const never = new AbortController().signal;
  let root: string;
  let folder: string;
  let input: string;
  beforeAll(async () => {
    await buildDecodingChild();
    root = await mkdtemp(join(tmpdir(), 'lampwright-media-'));
  });
  beforeEach(async () => {
    folder = await mkdtemp(join(root, 'task-'));
    input = join(folder, 'input');
  });
  afterAll(() => rm(root, { recursive: true, force: true }));

  const image = async (bytes: Buffer, drawing = false) => {
    await writeFile(input, bytes);
    return decoder.run({ kind: 'image', input, folder, drawing }, never);
  };
  const page = async (bytes: Buffer, number = 1) => {
    await writeFile(input, bytes);
    return decoder.run({ kind: 'pdf-page', input, folder, page: number }, never);
  };
  const inspect = async (bytes: Buffer) => {
    await writeFile(input, bytes);
    return decoder.run({ kind: 'pdf-inspect', input, folder }, never);
  };
  const refusal = async (work: Promise<unknown>): Promise<DecodeRefusal> =>
    work.then(
      () => Promise.reject(new Error('nothing was refused')),
      (error: DecodeRefusal) => error,
    );
  /** The colour at a place given as shares of width and height, each channel to full or nothing. */
  const colourAt = async (file: string, x: number, y: number) => {
    const { data, info } = await sharp(file).raw().toBuffer({ resolveWithObject: true });
    const at = (Math.floor(y * info.height) * info.width + Math.floor(x * info.width)) * info.channels;
    return [...data.subarray(at, at + 3)].map((level) => Math.round(level / 255)).join('');
  };
  const corners = async (file: string) =>
    Promise.all(
      (
        [
          [0.1, 0.1],
          [0.9, 0.1],
          [0.1, 0.9],
          [0.9, 0.9],
        ] as const
      ).map(([x, y]) => colourAt(file, x, y)),
    );
  const RED = '100';
  const GREEN = '010';
  const BLUE = '001';
  const WHITE = '111';

  it.each([
    [1, 600, [RED, GREEN, BLUE, WHITE]],
    [2, 600, [GREEN, RED, WHITE, BLUE]],
    [3, 600, [WHITE, BLUE, GREEN, RED]],
    [4, 600, [BLUE, WHITE, RED, GREEN]],
    [5, 400, [RED, BLUE, GREEN, WHITE]],
    [6, 400, [BLUE, RED, WHITE, GREEN]],
    [7, 400, [WHITE, GREEN, BLUE, RED]],
    [8, 400, [GREEN, WHITE, RED, BLUE]],
  ])('turns a photo of EXIF orientation %i upright', async (orientation, width, expected) => {
    const made = await image(await phonePhoto(orientation));
    expect(made.widthPx).toBe(width);
    expect(await corners(made.image)).toEqual(expected);
    expect(await corners(made.thumbnail)).toEqual(expected);
  });

  it('strips the place where a photo was taken, and all other metadata', async () => {
    const photo = await phonePhoto();
    const { exif: before } = await sharp(photo).metadata();
    // The tag of the directory that holds the place, in either byte order.
    expect(before?.includes('8825', 0, 'hex') || before?.includes('2588', 0, 'hex')).toBe(true);
    expect(photo.includes(PHONE_DESCRIPTION)).toBe(true);
    const made = await image(photo);
    for (const file of [made.image, made.thumbnail]) {
      const { exif, xmp, iptc, icc, orientation } = await sharp(file).metadata();
      expect({ exif, xmp, iptc, icc, orientation }).toEqual({});
      const bytes = await readFile(file);
      expect([bytes.includes('Exif'), bytes.includes(PHONE_DESCRIPTION)]).toEqual([false, false]);
    }
  });

  it('reduces to 4096 px on the long edge, and to a thumbnail of 480', async () => {
    const made = await image(await noisePhoto(6000, 1500));
    expect(made).toMatchObject({ widthPx: 4096, heightPx: 1024, imageType: 'image/jpeg' });
    const { width, height } = await sharp(made.thumbnail).metadata();
    expect([width, height]).toEqual([480, 120]);
  });

  it('keeps a drawing without loss, and a photo as JPEG', async () => {
    const png = await quarters().png().toBuffer();
    const drawing = await image(png, true);
    expect(drawing.imageType).toBe('image/png');
    const pixels = (file: Buffer | string) => sharp(file).removeAlpha().raw().toBuffer();
    expect((await pixels(drawing.image)).equals(await pixels(png))).toBe(true);
    expect((await image(png, false)).imageType).toBe('image/jpeg');
    expect((await image(await quarters().webp().toBuffer())).widthPx).toBe(600);
  });

  it('puts see-through drawings on white', async () => {
    const clear = {
      create: { width: 64, height: 64, channels: 4 as const, background: { r: 0, g: 0, b: 0, alpha: 0 } },
    };
    const made = await image(await sharp(clear).png().toBuffer(), true);
    expect(await colourAt(made.image, 0.5, 0.5)).toBe(WHITE);
  });

  it('refuses a small file of huge dimensions before it unpacks any of it', async () => {
    const bomb = flatPng(50_000, 50_000);
    expect(bomb.length).toBeLessThan(20_000);
    const refused = await refusal(image(bomb));
    expect(refused).toMatchObject({ code: 'too-many-pixels' });
    expect(refused.message).toContain('2500 megapixels');
  });

  it('refuses what is cut off, and says that it is damaged', async () => {
    const photo = await noisePhoto(800, 600);
    const cut = await refusal(image(photo.subarray(0, photo.length / 2)));
    expect(cut).toMatchObject({ code: 'file-damaged' });
    const short = await refusal(image(flatPng(4000, 4000)));
    expect(short).toMatchObject({ code: 'file-damaged' });
    expect(await refusal(image(Buffer.from([0xff, 0xd8, 0xff, 0xe0, 1, 2, 3])))).toMatchObject({
      code: 'file-damaged',
    });
  });

  it('refuses a picture too small to draw on', async () => {
    const speck = await sharp({ create: { width: 9, height: 900, channels: 3, background: 'red' } })
      .png()
      .toBuffer();
    expect(await refusal(image(speck))).toMatchObject({ code: 'too-few-pixels' });
  });

  it('reads 100 megapixels within one gigabyte, upright and progressive', async () => {
    const large = await sharp({ create: { width: 10_000, height: 10_000, channels: 3, background: 'teal' } })
      .withMetadata({ orientation: 6 })
      .jpeg({ progressive: true, chromaSubsampling: '4:4:4' })
      .toBuffer();
    const made = await image(large);
    expect([made.widthPx, made.heightPx]).toEqual([4096, 4096]);
    expect(made.peakBytes).toBeLessThan(GIGABYTE);
    expect(made.peakBytes).toBeGreaterThan(30e6);
  });

  it('draws a page at 200 dots per inch, and tells the scale that it really used', async () => {
    const made = await page(pdf(1, 792, 612));
    expect(made).toMatchObject({ widthPx: 2200, heightPx: 1700, imageType: 'image/png' });
    expect(made.pixelsPerPaperMeter).toBeCloseTo(200 / 0.0254, 9);
    // The line from corner to corner is there.
    expect(await colourAt(made.image, 0.5, 0.5)).toBe('000');
  });

  it('draws a large page to 4096 px, with the scale that follows', async () => {
    const made = await page(pdf(1, 3456, 2592));
    expect(made.widthPx).toBe(4096);
    const dpi = made.pixelsPerPaperMeter * 0.0254;
    expect(Math.abs((3456 / 72) * dpi - 4096)).toBeLessThan(1);
  });

  it('counts pages and shows small pictures of them', async () => {
    const three = await inspect(pdf(3));
    expect(three.pageCount).toBe(3);
    expect(three.previews.map((preview) => preview.page)).toEqual([1, 2, 3]);
    const { width } = await sharp(three.previews[2]!.file).metadata();
    expect(width).toBe(360);
    expect(await inspect(pdf(1))).toMatchObject({ pageCount: 1, previews: [] });
    expect((await inspect(pdf(50))).previews).toHaveLength(50);
  });

  it('refuses 51 pages, a locked and a broken PDF, each in its own words', async () => {
    expect(await refusal(inspect(pdf(51)))).toMatchObject({ code: 'too-many-pages' });
    expect(await refusal(inspect(lockedPdf()))).toMatchObject({ code: 'pdf-locked' });
    const broken = await refusal(inspect(Buffer.from('%PDF-1.4\nnothing of the kind')));
    expect(broken).toMatchObject({ code: 'pdf-unreadable' });
    expect(await refusal(page(pdf(2), 7))).toMatchObject({ code: 'pdf-unreadable' });
  });

  it('ends a child that takes too long, or too much, or is no longer wanted', async () => {
    await writeFile(input, await noisePhoto(4000, 3000));
    const task = { kind: 'image', input, folder, drawing: true } as const;
    const slow = await refusal(decoder.run(task, never, { wallMs: 50, rssBytes: GIGABYTE }));
    expect(slow).toMatchObject({ code: 'too-slow', passing: true });
    const large = await refusal(decoder.run(task, never, { wallMs: 60_000, rssBytes: 60e6 }));
    expect(large).toMatchObject({ code: 'too-much-memory', passing: false });
    const stop = new AbortController();
    const running = decoder.run(task, stop.signal);
    setTimeout(() => stop.abort(), 50);
    await expect(running).rejects.toBeInstanceOf(DecodeAborted);
    await expect(decoder.run(task, stop.signal)).rejects.toBeInstanceOf(DecodeAborted);
  });
});
