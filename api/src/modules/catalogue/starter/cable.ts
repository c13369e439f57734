import type { CableItem } from '@lampwright/geometry/catalogue';

/** Ampacities are those that the estimate contract assumes (60 °C copper, common practice). */
const byGauge = ([awg, ampacityAmps]: readonly [8 | 10 | 12 | 14 | 16 | 18, number]): CableItem => ({
  category: 'cable',
  name: `${awg} AWG landscape cable, 2-core`,
  conductor: { awg },
  ampacityAmps,
  directBurial: true,
});

const bySection = ([mm2, ampacityAmps]: readonly [1.5 | 2.5 | 4 | 6, number]): CableItem => ({
  category: 'cable',
  name: `2 × ${mm2} mm² garden cable`,
  conductor: { mm2 },
  ampacityAmps,
  directBurial: true,
});

const gauges = [
  [8, 40],
  [10, 30],
  [12, 20],
  [14, 15],
  [16, 10],
  [18, 7],
] as const;
const sections = [
  [1.5, 15],
  [2.5, 20],
  [4, 27],
  [6, 34],
] as const;

export const cables: readonly CableItem[] = [...gauges.map(byGauge), ...sections.map(bySection)];
