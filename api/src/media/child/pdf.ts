import { execFile } from 'node:child_process';
import { rm } from 'node:fs/promises';
import { join } from 'node:path';
import { promisify } from 'node:util';
import {
  ALL_PREVIEWS_MS,
  MAX_EDGE_PX,
  MAX_PAGES,
  PAGE_PREVIEW_EDGE_PX,
  PAGE_PREVIEW_MS,
  PAPER_DPI,
  PDF_PROGRAM_AS_BYTES,
  PDF_PROGRAM_CPU_SECONDS,
} from '../limits.js';
import { keepDrawing, type Picture, writePreview } from './images.js';
import { Refusal } from './refusal.js';

const run = promisify(execFile);

const POINTS_PER_INCH = 72;
const METERS_PER_INCH = 0.0254;

const unreadable = () =>
  new Refusal('pdf-unreadable', 'This PDF is damaged and could not be read. Export it again and send that.');

/** Runs one of poppler's programs with its own limits of memory and processor time. */
async function poppler(
  program: 'pdfinfo' | 'pdftoppm',
  args: readonly string[],
  timeout = 0,
): Promise<string> {
  const limits = [`--as=${PDF_PROGRAM_AS_BYTES}`, `--cpu=${PDF_PROGRAM_CPU_SECONDS}`, '--core=0'];
  try {
    const { stdout } = await run('prlimit', [...limits, '--', program, ...args], {
      timeout,
      killSignal: 'SIGKILL',
      maxBuffer: 1024 * 1024,
    });
    return stdout;
  } catch (error) {
    const said = error instanceof Error && 'stderr' in error ? String(error.stderr) : '';
    if (/incorrect password/i.test(said))
      throw new Refusal(
        'pdf-locked',
        'This PDF is locked with a password. Save a copy without one and send that.',
      );
    throw unreadable();
  }
}

/** The number of pages, and small pictures of them where there are several to choose from. */
export async function inspectPdf(input: string, folder: string) {
  const pageCount = Number(/^Pages:\s+(\d+)\s*$/m.exec(await poppler('pdfinfo', [input]))?.[1]);
  if (!(pageCount >= 1)) throw unreadable();
  if (pageCount > MAX_PAGES)
    throw new Refusal(
      'too-many-pages',
      `This PDF has ${pageCount} pages; at most ${MAX_PAGES} can be taken. Send only the page with the plot plan.`,
    );
  const previews: { page: number; file: string }[] = [];
  const end = Date.now() + ALL_PREVIEWS_MS;
  for (let page = 1; pageCount > 1 && page <= pageCount; page += 1) {
    const time = Math.min(PAGE_PREVIEW_MS, end - Date.now());
    if (time <= 0) break;
    const file = await previewOf(input, folder, page, time);
    if (file !== null) previews.push({ page, file });
  }
  return { pageCount, previews };
}

/** Null for a page that can't be drawn in time: it can still be chosen by its number. */
async function previewOf(input: string, folder: string, page: number, time: number): Promise<string | null> {
  const drawn = join(folder, `preview-${page}`);
  const file = join(folder, `page-${page}.jpg`);
  try {
    // Drawn at twice the size and reduced, so that hairlines stay visible.
    const size = ['-scale-to', String(2 * PAGE_PREVIEW_EDGE_PX)];
    await poppler('pdftoppm', [...ofPage(page), ...size, '-png', '-singlefile', input, drawn], time);
    await writePreview(`${drawn}.png`, file);
    return file;
  } catch {
    return null;
  } finally {
    await rm(`${drawn}.png`, { force: true });
  }
}

/** Draws a page at 200 dpi, or at what makes its long edge 4096 px where that is less. */
export async function drawPage(
  input: string,
  folder: string,
  page: number,
): Promise<Picture & { pixelsPerPaperMeter: number }> {
  const size = /^Page\s+\d+ size:\s+([\d.]+) x ([\d.]+) pts/m.exec(
    await poppler('pdfinfo', ['-f', String(page), '-l', String(page), input]),
  );
  const longPoints = Math.max(Number(size?.[1]), Number(size?.[2]));
  if (!(longPoints > 0)) throw unreadable();
  // The page's edge is rounded up to a whole pixel: aim half a pixel below the limit.
  const dpi = Math.min(PAPER_DPI, ((MAX_EDGE_PX - 0.5) * POINTS_PER_INCH) / longPoints);
  const drawn = join(folder, 'drawn');
  await poppler('pdftoppm', [...ofPage(page), '-r', String(dpi), '-png', '-singlefile', input, drawn]);
  const picture = await keepDrawing(`${drawn}.png`, folder).catch(() => {
    throw unreadable();
  });
  return { ...picture, pixelsPerPaperMeter: dpi / METERS_PER_INCH };
}

/** The visible part of the page, which is also what pdfinfo tells the size of. */
const ofPage = (page: number): string[] => ['-f', String(page), '-l', String(page), '-cropbox'];
