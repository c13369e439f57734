import { fileURLToPath } from 'node:url';

const demoFile = (name: string): string =>
  fileURLToPath(new URL(`../../api/src/demo/files/${name}`, import.meta.url));

/** The yard whose true measures stand in yard.ts. */
export const yardPhotoFile = demoFile('yard-photo.jpg');
/** 11 × 17 in, 1 in = 10 ft; its measures stand in plot.ts. */
export const plotPlanFile = demoFile('plot-plan.pdf');
