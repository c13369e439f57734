import { type CSSProperties, useMemo } from 'react';
import styles from './evening-line.module.css';
import { hoursInWords, momentInWords } from './moment-words';
import { type Moment, type SheetEvening, STEP_MINUTES } from './sheet-evening';
import { lightsGradient, placeOf, skyGradient } from './track';

interface Props {
  readonly evening: SheetEvening;
  readonly moment: Moment;
  /** Zones that are not looked at: they stay dark in the picture. */
  readonly darkened: ReadonlySet<string>;
  readonly onMinute: (minute: number) => void;
  readonly onDarkened: (darkened: ReadonlySet<string>) => void;
}

/** From before sunset to after lights-out: moves the picture through the evening. */
export function EveningLine({ evening, moment, darkened, onMinute, onDarkened }: Props) {
  const { zones, sunset, off, minutes, day } = evening;
  const only = zones.length === 1 ? zones[0] : undefined;
  const looked = zones.filter(({ id }) => !darkened.has(id));
  const sky = useMemo(() => skyGradient(evening), [evening]);
  const words = momentInWords(evening, moment, (id) => !darkened.has(id));
  const place = (minute: number): CSSProperties => ({ ['--place' as string]: placeOf(evening, minute) });

  const toggle = (id: string): void => {
    const next = new Set(darkened);
    if (!next.delete(id)) next.add(id);
    onDarkened(next);
  };

  return (
    <>
      <div className={styles.time} aria-hidden="true">
        <span style={place(moment.minute)}>{moment.clock}</span>
      </div>
      <input
        type="range"
        className={styles.line}
        style={{ ['--sky' as string]: sky, ['--lights' as string]: lightsGradient(evening, looked) }}
        min={0}
        max={minutes}
        step={STEP_MINUTES}
        value={moment.minute}
        aria-label="Time of the evening"
        aria-valuetext={words}
        onChange={(event) => onMinute(Number(event.target.value))}
      />
      <div className={styles.ends}>
        <span>{sunset ? `Sunset ${sunset.clock}` : evening.at(0).clock}</span>
        <span>{day}</span>
        <span>{off ? `Off ${off.clock}` : evening.at(minutes).clock}</span>
      </div>
      {only && <p className={styles.words}>{hoursInWords(only)}</p>}
      {zones.length > 1 && (
        <fieldset className={styles.zones}>
          <legend>
            Look at it with <span>(only for looking: the price stays)</span>
          </legend>
          <div>
            {zones.map(({ id, name, hours }) => (
              <button
                key={id}
                type="button"
                aria-pressed={!darkened.has(id)}
                data-on={(moment.on.has(id) && !darkened.has(id)) || undefined}
                onClick={() => toggle(id)}
              >
                {name}
                <small>{hours}</small>
              </button>
            ))}
          </div>
        </fieldset>
      )}
      {evening.note !== null && <p className={styles.words}>{evening.note}</p>}
    </>
  );
}
