import type { Aim } from '@lampwright/geometry/plan';
import { useCallback, useMemo } from 'react';
import type { Point } from '../../../plan-view/camera';
import { buildScene, emptyScene } from '../../../plan-view/scene';
import { areaWord } from '../page/area-words';
import {
  useDoc,
  useEstimate,
  useScale,
  useSession,
  useSheet,
  useTools,
  useUnitSystem,
} from '../page/context';
import { areaText, lengthText as lengthOf, plainLength } from '../page/lengths';
import { referenceLines } from '../scale/reference-lines';
import { drawnAim } from '../tools/light-pose';
import type { DrawnAim } from '../tools/proposed';

/** The open sheet as drawable data; built anew only when the plan, its volts or its scale change. */
export function useScene() {
  const doc = useDoc();
  const sheetId = useSession((s) => s.sheetId);
  const answers = useEstimate((s) => s.answers);
  const unwired = useEstimate((s) => s.unwired);
  const lengths = useEstimate((s) => s.lengths);
  const scale = useScale();
  const units = useUnitSystem();
  const lengthText = useCallback(
    (points: readonly Point[]) => lengthOf(scale, points, units),
    [scale, units],
  );
  const scene = useMemo(() => {
    if (!doc.has(sheetId)) return emptyScene;
    return buildScene(
      doc,
      sheetId,
      { answers, unwired },
      {
        lengthText,
        heightText: (m) => `${plainLength(m, units)} high`,
        cableLength: (id) => {
          const total = lengths.get(id)?.totalMeters ?? null;
          return total === null ? '' : plainLength(total, units);
        },
        areaText: ({ name, use, points }) =>
          [name || areaWord(use), areaText(scale, points, units)].filter(Boolean).join(' · '),
      },
    );
  }, [doc, sheetId, answers, unwired, lengths, scale, units, lengthText]);
  const sheet = useSheet();
  const scaling = useTools((s) => s.toolId === 'scale');
  const shown = useMemo(() => {
    if (!scaling || sheet === undefined) return scene;
    const lines = referenceLines(sheet, (m) => plainLength(m, units));
    return { ...scene, measurements: [...scene.measurements, ...lines] };
  }, [scene, scaling, sheet, units]);
  const aimOf = useMemo(() => {
    const world = { doc: () => doc, sheetId: () => sheetId, scale: () => scale };
    const kept = new Map<string, DrawnAim | null>();
    return (id: string, aim?: Aim | null): DrawnAim | null => {
      if (aim !== undefined) return drawnAim(world, id, aim);
      const before = kept.get(id);
      if (before !== undefined) return before;
      const drawn = drawnAim(world, id);
      kept.set(id, drawn);
      return drawn;
    };
  }, [doc, sheetId, scale]);
  return { scene: shown, lengthText, aimOf };
}
