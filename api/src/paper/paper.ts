import PDFDocument from 'pdfkit';
import { cleanText } from './clean-text.js';
import { colours, fontFiles, type Weight, weights } from './face.js';
import { wrapText } from './wrap.js';

export type PaperSize = 'LETTER' | 'A4';
export type Orientation = 'portrait' | 'landscape';

export interface PaperOptions {
  readonly size: PaperSize;
  readonly title: string;
  readonly author: string;
  readonly subject: string;
  /** BCP 47, of the words. */
  readonly lang: string;
  /** The same input must give the same bytes, so the clock is not asked. */
  readonly madeAt: Date;
}

export interface TextStyle {
  readonly size: number;
  readonly weight?: Weight;
  readonly colour?: string;
}

export interface FlowOptions {
  readonly x?: number;
  readonly width?: number;
  /** Points below it. */
  readonly after?: number;
}

const MARGIN = 46;
/** The footer stands in it, apart from what flows. */
const FOOT = 34;
const LEADING = 1.42;
/** Of Work Sans, in ems. */
const ASCENT = 0.93;
const DESCENT = 0.243;
const EM = 1000;
/** Figures of one width, so that columns of sums line up. */
const FEATURES: PDFKit.Mixins.OpenTypeFeatures[] = ['tnum'];

export const leadingOf = (style: TextStyle): number => style.size * LEADING;

/** What is read of pdfkit's font, beyond its types. */
interface FontInside {
  readonly font: { hasGlyphForCodePoint(codePoint: number): boolean };
  widthOfString(text: string, size: number, features: readonly string[]): number;
}

/** Pages with a place to write on that moves down and over to the next page. Lengths in points, y downwards. */
export class Paper {
  readonly doc: PDFKit.PDFDocument;
  /** Where the next thing goes. */
  y = MARGIN;
  private readonly fonts = new Map<Weight, FontInside>();
  private readonly widths = new Map<string, number>();
  private readonly cleaned = new Map<string, string>();
  private readonly chunks: Buffer[] = [];
  private readonly ended: Promise<void>;

  constructor(private readonly options: PaperOptions) {
    const files = fontFiles();
    this.doc = new PDFDocument({
      autoFirstPage: false,
      bufferPages: true,
      pdfVersion: '1.7',
      lang: options.lang,
      displayTitle: true,
      margin: 0,
      font: files.regular as unknown as string,
      info: {
        Title: options.title,
        Author: options.author,
        Subject: options.subject,
        Creator: 'Lampwright',
        Producer: 'Lampwright',
        CreationDate: options.madeAt,
        ModDate: options.madeAt,
      },
    });
    this.ended = new Promise((resolve, reject) => {
      this.doc.on('data', (chunk: Buffer) => this.chunks.push(chunk));
      this.doc.on('end', resolve);
      this.doc.on('error', reject);
    });
    for (const weight of weights) {
      this.doc.registerFont(weight, files[weight]);
      this.doc.font(weight);
      this.fonts.set(weight, (this.doc as unknown as { _font: FontInside })._font);
    }
  }

  get left(): number {
    return MARGIN;
  }
  get right(): number {
    return this.doc.page.width - MARGIN;
  }
  get top(): number {
    return MARGIN;
  }
  get bottom(): number {
    return this.doc.page.height - MARGIN - FOOT;
  }
  get width(): number {
    return this.right - this.left;
  }
  get room(): number {
    return this.bottom - this.y;
  }

  /** The area within the margins of a page of that orientation. */
  innerSize(orientation: Orientation): { readonly width: number; readonly height: number } {
    const [short, long] = this.options.size === 'LETTER' ? [612, 792] : [595.28, 841.89];
    const [width, height] = orientation === 'portrait' ? [short, long] : [long, short];
    return { width: width - 2 * MARGIN, height: height - 2 * MARGIN - FOOT };
  }

  addPage(orientation: Orientation = 'portrait'): void {
    this.doc.addPage({ size: this.options.size, layout: orientation, margin: 0 });
    this.y = this.top;
  }

  /** Goes to the next page if so much height is not left on this one, unless nothing is on it yet. */
  need(height: number): void {
    if (this.room < height && this.y > this.top) this.addPage();
  }

  bookmark(title: string): void {
    this.doc.outline.addItem(this.clean(title).replaceAll('\n', ' '));
  }

  clean(text: string): string {
    let clean = this.cleaned.get(text);
    if (clean === undefined) {
      const inside = this.fonts.get('regular')!.font;
      clean = cleanText(text, (code) => inside.hasGlyphForCodePoint(code));
      this.cleaned.set(text, clean);
    }
    return clean;
  }

  /** Width of clean text on one line. */
  widthOf(text: string, { size, weight = 'regular' }: TextStyle): number {
    const name = `${weight} ${text}`;
    let width = this.widths.get(name);
    if (width === undefined) {
      width = this.fonts.get(weight)!.widthOfString(text, EM, FEATURES);
      this.widths.set(name, width);
    }
    return (width * size) / EM;
  }

  wrap(text: string, width: number, style: TextStyle): string[] {
    return wrapText(this.clean(text), width, (piece) => this.widthOf(piece, style));
  }

  /** One line of clean text with its top at y. */
  line(text: string, x: number, y: number, style: TextStyle): void {
    if (text === '') return;
    const { size, weight = 'regular', colour = colours.ink } = style;
    const baseline = y + (leadingOf(style) - (ASCENT + DESCENT) * size) / 2 + ASCENT * size;
    this.doc
      .font(weight)
      .fontSize(size)
      .fillColor(colour)
      .text(text, x, baseline, { lineBreak: false, baseline: 'alphabetic', features: FEATURES });
  }

  /** One line that ends at x. */
  lineTo(text: string, x: number, y: number, style: TextStyle): void {
    this.line(text, x - this.widthOf(text, style), y, style);
  }

  lineCentred(text: string, x: number, y: number, style: TextStyle): void {
    this.line(text, x - this.widthOf(text, style) / 2, y, style);
  }

  /** Text that flows down and over pages. */
  flow(text: string, style: TextStyle, { x = this.left, width, after = 0 }: FlowOptions = {}): void {
    const leading = leadingOf(style);
    for (const line of this.wrap(text, width ?? this.right - x, style)) {
      this.need(leading);
      this.line(line, x, this.y, style);
      this.y += leading;
    }
    this.y += after;
  }

  rule(y = this.y, colour: string = colours.rule, weight = 0.6): void {
    this.doc.save().lineWidth(weight).strokeColor(colour);
    this.doc.moveTo(this.left, y).lineTo(this.right, y).stroke().restore();
  }

  /** Writes what every page ends with, and gives the bytes. */
  async finish(foot: (page: number, pages: number) => void): Promise<Buffer> {
    const { start, count } = this.doc.bufferedPageRange();
    for (let page = 0; page < count; page += 1) {
      this.doc.switchToPage(start + page);
      foot(page + 1, count);
    }
    this.doc.end();
    await this.ended;
    return Buffer.concat(this.chunks);
  }
}
