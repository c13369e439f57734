import { luxText } from '@lampwright/geometry/light';
import { setFields } from '@lampwright/geometry/plan';
import { useEffect, useId, useRef, useState } from 'react';
import { useEditor, useSheet } from '../page/context';
import { useLuxUnit, useNight, useNightController } from './context';
import styles from './light-panel.module.css';
import { Part } from './Part';

/** The steps of the slider in lux: each about a quarter more than the one before, as eyes count light. */
const STEPS = [
  2, 2.5, 3, 4, 5, 6, 8, 10, 12, 15, 20, 25, 30, 40, 50, 60, 80, 100, 120, 150, 200, 250, 300, 400, 500, 600,
  800, 1000,
];

/** The step that is nearest in proportion. */
function stepOf(lux: number): number {
  const off = (step: number) => Math.abs(Math.log(STEPS[step]! / lux));
  return STEPS.reduce((best, _, step) => (off(step) < off(best) ? step : best), 0);
}

/** How bright a spot must be to be shown as white: the picture's exposure, fixed for the sheet. */
export function BrightSpot() {
  const editor = useEditor();
  const night = useNightController();
  const sheet = useSheet();
  const unit = useLuxUnit();
  const own = useNight((s) => s.scene?.whiteLux);
  const id = useId();
  const [tried, setTried] = useState<number | null>(null);
  const latest = useRef(tried);
  latest.current = tried;
  useEffect(() => () => night.tryWhite(null), [night]);
  if (sheet === undefined || own === undefined) return null;
  const shown = tried ?? own;
  const take = () => {
    const lux = latest.current;
    if (lux === null) return;
    setTried(null);
    if (lux !== own)
      editor.edit('Set bright spot', (doc) => setFields(doc, [sheet.id], 'sheet', { whiteLux: lux }));
    night.tryWhite(null);
  };
  return (
    <Part title="Bright spot" aside={<output htmlFor={id}>{luxText(shown, unit)} shows as white</output>}>
      <input
        id={id}
        type="range"
        className={styles.slider}
        min={0}
        max={STEPS.length - 1}
        step={1}
        // To the right the picture gets brighter: less light is enough for white.
        value={STEPS.length - 1 - stepOf(shown)}
        disabled={!editor.canEdit}
        aria-label="How bright the picture is shown"
        aria-valuetext={`${luxText(shown, unit)} shows as white`}
        onChange={(event) => {
          const lux = STEPS[STEPS.length - 1 - Number(event.target.value)]!;
          setTried(lux);
          night.tryWhite(lux);
        }}
        onPointerUp={take}
        onKeyUp={take}
        onBlur={take}
      />
      <p className={styles.ends} aria-hidden="true">
        <span>Darker</span>
        <span>Brighter</span>
      </p>
    </Part>
  );
}
