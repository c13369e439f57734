import { parseLength } from './length.js';

export type ParsedDrawingScale =
  | {
      readonly ok: true;
      /** 1 in = 10 ft is 120; 1:100 is 100. */
      readonly groundMetersPerPaperMeter: number;
    }
  | { readonly ok: false; readonly code: 'empty' | 'unreadable' | 'out-of-range'; readonly message: string };

const ACCEPTED = 'Write a scale such as 1 in = 10 ft, 1/4" = 1\' or 1:100.';

/** Plans of yards run from full size to maps of a district; beyond that it is a slip. */
const LARGEST_RATIO = 100_000;

/** Reads a drawing's written scale: two lengths with their units, or a bare ratio. */
export function parseDrawingScale(text: string): ParsedDrawingScale {
  const typed = text.trim();
  if (typed === '') return { ok: false, code: 'empty', message: ACCEPTED };
  const sides = typed.split(/[=:∶]/);
  const paper = sides.length === 2 ? parseLength(sides[0]!, { preferred: 'metric' }) : null;
  const ground = sides.length === 2 ? parseLength(sides[1]!, { preferred: 'metric' }) : null;
  // One side with a unit and one without could mean anything; without any it is a ratio.
  if (!paper?.ok || !ground?.ok || paper.unitGiven !== ground.unitGiven || paper.meters === 0) {
    return {
      ok: false,
      code: 'unreadable',
      message: `“${typed.slice(0, 40)}” is not a drawing scale. ${ACCEPTED}`,
    };
  }
  const ratio = ground.meters / paper.meters;
  if (!(ratio >= 1 && ratio <= LARGEST_RATIO)) {
    return {
      ok: false,
      code: 'out-of-range',
      message: `“${typed.slice(0, 40)}” is 1:${Number(ratio.toPrecision(3))}; a plan’s scale lies between 1:1 and 1:100,000. ${ACCEPTED}`,
    };
  }
  return { ok: true, groundMetersPerPaperMeter: ratio };
}

/** The scale as a ratio for the eye: `1:120`. */
export function formatRatio(groundMetersPerPaperMeter: number): string {
  return `1:${Number(groundMetersPerPaperMeter.toPrecision(5))}`;
}
