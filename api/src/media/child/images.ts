import { stat } from 'node:fs/promises';
import { join } from 'node:path';
import sharp, { type Sharp } from 'sharp';
import {
  MAX_EDGE_PX,
  MAX_PIXELS,
  MAX_PNG_BYTES,
  MIN_EDGE_PX,
  PAGE_PREVIEW_EDGE_PX,
  THUMBNAIL_EDGE_PX,
} from '../limits.js';
import { Refusal } from './refusal.js';

sharp.cache(false);
sharp.concurrency(1);

export interface Picture {
  readonly image: string;
  readonly imageType: 'image/jpeg' | 'image/png';
  readonly thumbnail: string;
  readonly widthPx: number;
  readonly heightPx: number;
}

/** Read from top to bottom, so that a large file is never whole in memory; broken data is an error. */
const READING = { limitInputPixels: MAX_PIXELS, sequentialRead: true, failOn: 'error' } as const;

const damaged = () =>
  new Refusal('file-damaged', 'This picture is damaged or incomplete and could not be read to its end.');

/**
 * Makes the stored image and its thumbnail of an uploaded picture: turned upright as its EXIF says, long edge
 * at most 4096 px, in sRGB, and without any metadata (a phone writes the place where it was taken).
 */
export async function decodePicture(input: string, folder: string, drawing: boolean): Promise<Picture> {
  const { orientation, format } = await headerOf(input);
  // Made smaller first and turned then: the other way round the whole picture has to be unpacked in memory.
  const reduced = await sharp(input, READING)
    .resize({ width: MAX_EDGE_PX, height: MAX_EDGE_PX, fit: 'inside', withoutEnlargement: true })
    .flatten({ background: 'white' })
    .withMetadata({ orientation: orientation ?? 1 })
    .tiff({ compression: 'none' })
    .toBuffer()
    .catch(() => {
      throw damaged();
    });
  const upright = () => sharp(reduced).autoOrient();
  return write(upright, folder, drawing && format !== 'jpeg');
}

/** Makes image and thumbnail of a page that was drawn on purpose: its pixels are kept as they are. */
export const keepDrawing = (input: string, folder: string): Promise<Picture> =>
  write(() => sharp(input, READING).flatten({ background: 'white' }), folder, true);

/** A small picture of a page for the page picker. */
export async function writePreview(input: string, output: string): Promise<void> {
  await sharp(input, READING)
    .resize({
      width: PAGE_PREVIEW_EDGE_PX,
      height: PAGE_PREVIEW_EDGE_PX,
      fit: 'inside',
      withoutEnlargement: true,
    })
    .flatten({ background: 'white' })
    .jpeg({ quality: 80 })
    .toFile(output);
}

async function headerOf(input: string) {
  const header = await sharp(input, { limitInputPixels: false, failOn: 'error' })
    .metadata()
    .catch(() => {
      throw damaged();
    });
  const { width, height } = header;
  if (width * height > MAX_PIXELS) {
    const megapixels = Math.ceil((width * height) / 1e6);
    throw new Refusal(
      'too-many-pixels',
      `This picture has ${megapixels} megapixels (${width} × ${height}); at most ${MAX_PIXELS / 1e6} can be read. Save it smaller and send it again.`,
    );
  }
  if (Math.min(width, height) < MIN_EDGE_PX)
    throw new Refusal(
      'too-few-pixels',
      `This picture has only ${width} × ${height} pixels; nothing could be drawn on it.`,
    );
  return header;
}

async function write(open: () => Sharp, folder: string, lossless: boolean): Promise<Picture> {
  const thumbnail = join(folder, 'thumbnail.jpg');
  await open()
    .resize({ width: THUMBNAIL_EDGE_PX, height: THUMBNAIL_EDGE_PX, fit: 'inside', withoutEnlargement: true })
    .jpeg({ quality: 80 })
    .toFile(thumbnail);
  if (lossless) {
    const image = join(folder, 'image.png');
    const info = await open().png({ compressionLevel: 9 }).toFile(image);
    if ((await stat(image)).size <= MAX_PNG_BYTES)
      return { image, imageType: 'image/png', thumbnail, widthPx: info.width, heightPx: info.height };
  }
  const image = join(folder, 'image.jpg');
  const info = await open().jpeg({ quality: 85 }).toFile(image);
  return { image, imageType: 'image/jpeg', thumbnail, widthPx: info.width, heightPx: info.height };
}
