import { createInterface } from 'node:readline';
import type { DecodeResult, DecodeTask } from '../task.js';
import { decodePicture } from './images.js';
import { drawPage, inspectPdf } from './pdf.js';
import { Refusal } from './refusal.js';
import { readTable } from './tables.js';

/**
 * The child process that opens uploaded files: one task on standard input, one answer on standard output.
 * It knows no secrets, and ends with its parent, which holds its standard input open.
 */
const lines = createInterface({ input: process.stdin });
lines.once('line', (line) => {
  void answer(JSON.parse(line) as DecodeTask);
});
lines.once('close', () => process.exit(1));

async function answer(task: DecodeTask): Promise<void> {
  const result = await work(task).catch((error: unknown) => {
    if (error instanceof Refusal)
      return { kind: 'refused', code: error.code, message: error.message } satisfies DecodeResult;
    throw error;
  });
  process.stdout.write(JSON.stringify(result), () => process.exit(0));
}

async function work(task: DecodeTask): Promise<DecodeResult> {
  switch (task.kind) {
    case 'image': {
      const picture = await decodePicture(task.input, task.folder, task.drawing);
      return { kind: 'image', ...picture, maxRssBytes: maxRss() };
    }
    case 'pdf-inspect':
      return { kind: 'pdf-inspect', ...(await inspectPdf(task.input, task.folder)), maxRssBytes: maxRss() };
    case 'pdf-page':
      return {
        kind: 'pdf-page',
        ...(await drawPage(task.input, task.folder, task.page)),
        maxRssBytes: maxRss(),
      };
    case 'table':
      return {
        kind: 'table',
        file: await readTable(task.input, task.folder, task.format),
        maxRssBytes: maxRss(),
      };
  }
}

/** The most memory that this process held at any time; Node tells it in kilobytes. */
const maxRss = (): number => process.resourceUsage().maxRSS * 1024;
