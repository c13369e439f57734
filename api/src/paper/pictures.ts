import sharp from 'sharp';
import type { Paper } from './paper.js';

/** What pdfkit gives for an opened picture; it is put into the document once, however often it is drawn. */
export interface Picture {
  readonly image: PDFKit.Mixins.ImageSrc;
}

/** Dots per inch that print shows of a picture; more only makes the document heavier. */
const DOTS_PER_INCH = 200;
const LONGEST_PX = 2000;

/**
 * A stored picture at what paper needs of it: no wider than a page at 200 dots per inch. Photos become JPEG;
 * drawings, whose lines JPEG would smear, stay PNG with few tones.
 */
export async function pictureFor(paper: Paper, source: Buffer, view: 'plan' | 'photo'): Promise<Picture> {
  const longest = Math.min(LONGEST_PX, Math.round((paper.innerSize('landscape').width / 72) * DOTS_PER_INCH));
  const reduced = sharp(source)
    .resize({ width: longest, height: longest, fit: 'inside', withoutEnlargement: true })
    .flatten({ background: '#FFFFFF' });
  const bytes =
    view === 'photo'
      ? await reduced.jpeg({ quality: 78, mozjpeg: true }).toBuffer()
      : await reduced.png({ palette: true, colours: 64, compressionLevel: 9, effort: 4 }).toBuffer();
  return asItIs(paper, bytes);
}

/** A picture that was made for paper already. */
export function asItIs(paper: Paper, bytes: Buffer): Picture {
  const { doc } = paper as unknown as { doc: { openImage(bytes: Buffer): PDFKit.Mixins.ImageSrc } };
  return { image: doc.openImage(bytes) };
}
