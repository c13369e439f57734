import { luxText, luxUnitText } from '@lampwright/geometry/light';
import { useMemo } from 'react';
import { useFigures, useLuxUnit, useNight } from './context';
import type { GroundFigure } from './ground-figures';

const none: readonly GroundFigure[] = [];
/** Less light than this, in lux, is not told, as a full moon gives about as much: the figures would only cover the dark. */
const LEAST_LUX = 0.2;

/** The figures of light on the ground of the open sheet, while they are wanted. */
export function useGroundFigures(): readonly GroundFigure[] {
  const lattice = useNight((s) => s.lattice);
  const open = useNight((s) => s.open && s.luxOnGround);
  const asked = useFigures((s) => s.asked);
  const answer = useFigures((s) => s.answer);
  const unit = useLuxUnit();
  return useMemo(() => {
    // Figures of an older lattice are of other places.
    if (!open || answer === null || asked?.places.length !== lattice.length) return none;
    return lattice.flatMap(({ at }, i) => {
      const lux = answer.lux[i] ?? 0;
      return lux < LEAST_LUX ? [] : [{ at, text: luxText(lux, unit).replace(` ${luxUnitText(unit)}`, '') }];
    });
  }, [open, lattice, asked, answer, unit]);
}
