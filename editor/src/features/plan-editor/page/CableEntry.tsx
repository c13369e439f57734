import { parseLength } from '@lampwright/geometry/units';
import { type FormEvent, useId, useState } from 'react';
import { Button } from '../../../components/button';
import { useEditor, useScale, useTools, useUnitSystem } from './context';
import { lengthText } from './lengths';
import styles from './page.module.css';

/** The cable in hand: its length so far, and typed lengths and angles for its next point. */
export function CableEntry() {
  const editor = useEditor();
  const scale = useScale();
  const system = useUnitSystem();
  const preview = useTools((s) => s.preview);
  const [length, setLength] = useState('');
  const [angle, setAngle] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const id = useId();
  const points = preview?.kind === 'cable' ? preview.points : [];
  const whole = preview?.kind === 'cable' && preview.pending !== null ? [...points, preview.pending] : points;
  const started = points.length > 0;

  const submit = (event: FormEvent) => {
    event.preventDefault();
    const parsed = parseLength(length, { preferred: system });
    if (!parsed.ok) {
      setFault(parsed.message);
      return;
    }
    const degrees = angle.trim() === '' ? null : Number(angle.trim().replace(',', '.').replace(/°$/, ''));
    if (degrees !== null && !Number.isFinite(degrees)) {
      setFault('Write the angle in degrees: 0 is to the right, 90 is away from you.');
      return;
    }
    setFault(null);
    editor.tools.handle({ type: 'typed', meters: parsed.meters, degrees });
    setLength('');
  };
  const finish = () => editor.tools.handle({ type: 'key', key: 'Enter', mods: { shift: false, alt: false } });
  const back = () => editor.tools.handle({ type: 'key', key: 'Escape', mods: { shift: false, alt: false } });

  return (
    <>
      <p className={styles.live} aria-live="off">
        {!started
          ? 'Click where the cable starts: the transformer, a fixture, a hub or another cable.'
          : scale === null
            ? 'Lengths wait for this sheet’s scale.'
            : `Drawn so far: ${lengthText(scale, whole, system) || '–'}`}
      </p>
      {started && (
        <>
          <form className={styles.typed} onSubmit={submit}>
            <label htmlFor={`${id}-l`}>Next</label>
            <input
              id={`${id}-l`}
              value={length}
              placeholder={system === 'imperial' ? '12′ 6″' : '3.8 m'}
              autoComplete="off"
              aria-describedby={fault === null ? undefined : `${id}-f`}
              onChange={(e) => setLength(e.target.value)}
            />
            <label htmlFor={`${id}-a`}>at</label>
            <input
              id={`${id}-a`}
              className={styles.angle}
              value={angle}
              placeholder="pointer"
              autoComplete="off"
              onChange={(e) => setAngle(e.target.value)}
            />
            <span aria-hidden="true">°</span>
            <Button type="submit">Add</Button>
          </form>
          {fault !== null && (
            <p id={`${id}-f`} role="alert" className={styles.small}>
              {fault}
            </p>
          )}
          <div className={styles.buttons}>
            <Button kind="strong" onClick={finish}>
              Finish cable
            </Button>
            <Button onClick={back}>Take back</Button>
          </div>
        </>
      )}
    </>
  );
}
