import { clockText, type Evening } from '@lampwright/geometry/night';
import {
  type KeyboardEvent,
  useEffect,
  useLayoutEffect,
  useMemo,
  useRef,
  useState,
  useSyncExternalStore,
} from 'react';
import { Link } from 'react-router-dom';
import { useNight, useNightController, useNightHere } from './context';
import styles from './evening-bar.module.css';
import { minutesInto, type Phase, phaseAt, shareOf, skyGradient, zonesOn } from './moments';
import { tickLabels } from './tick-labels';

/** Minutes of one step with the page keys. */
const FAR_MINUTES = 30;
const NEAR_MINUTES = 5;

function phaseWord(phase: Phase): string {
  switch (phase) {
    case 'daylight':
      return 'daylight';
    case 'dusk':
      return 'dusk';
    case 'dark':
      return 'dark';
  }
}

/** "all zones on", "2 of 3 zones on", "lights on". */
export function zonesWord(on: number, all: number): string {
  if (all === 0) return 'no lights';
  if (all === 1) return on === 1 ? 'lights on' : 'lights off';
  return `${on} of ${all} zones on`;
}

const stillMotion = '(prefers-reduced-motion: reduce)';
const watchMotion = (changed: () => void) => {
  const query = window.matchMedia(stillMotion);
  query.addEventListener('change', changed);
  return () => query.removeEventListener('change', changed);
};
const useStillness = (): boolean =>
  useSyncExternalStore(watchMotion, () => window.matchMedia(stillMotion).matches);

/** Light that takes longer than this to work out, in milliseconds, is said to be on its way. */
const LONG_WORK_MS = 500;

/** Whether light has been worked out for so long that a person wants to know. */
function useLongWork(): boolean {
  const night = useNightController();
  const [long, setLong] = useState(false);
  useEffect(() => {
    // Beside React: work that begins and ends with every step of a drag draws nothing anew.
    let timer: ReturnType<typeof setTimeout> | null = null;
    const look = () => {
      const working = night.state.getState().work.is === 'working';
      if (working === (timer !== null)) return;
      if (timer !== null) clearTimeout(timer);
      timer = working ? setTimeout(() => setLong(true), LONG_WORK_MS) : null;
      if (!working) setLong(false);
    };
    look();
    const stop = night.state.subscribe(look);
    return () => {
      stop();
      if (timer !== null) clearTimeout(timer);
    };
  }, [night]);
  return long;
}

/** The evening under the drawing: a line from before sunset to after lights-out, to move through. */
export function EveningBar() {
  const night = useNightController();
  const evening = useNight((s) => s.evening);
  const line = useNight((s) => s.line);
  const at = useNight((s) => s.at);
  const playing = useNight((s) => s.playing);
  const zones = useNight((s) => s.zones);
  const looks = useNight((s) => s.looks);
  const still = useStillness();
  const long = useLongWork();
  const locale = navigator.language;
  const clock = clockText(at, evening.timeZone, locale);
  const phase = phaseWord(phaseAt(evening, at));
  const lights = zonesWord(zonesOn(evening, zones, at, looks).size, zones.length);
  const minutes = minutesInto(line, at);
  const ground = useMemo(() => skyGradient(evening, line), [evening, line]);
  const [width, setWidth] = useState(0);
  const track = useRef<HTMLDivElement>(null);
  useLayoutEffect(() => {
    const element = track.current;
    if (element === null) return;
    const observer = new ResizeObserver(() => setWidth(element.clientWidth));
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  const labels = useMemo(
    () => tickLabels(evening, line, zones.length, width, navigator.language),
    [evening, line, zones.length, width],
  );
  const onKeyDown = (event: KeyboardEvent) => {
    const step =
      event.key === 'PageUp' ? FAR_MINUTES : event.key === 'PageDown' ? -FAR_MINUTES : stepOf(event.key);
    if (step === 0 || event.altKey || event.ctrlKey || event.metaKey) return;
    event.preventDefault();
    night.seek(minutes + (event.shiftKey ? Math.sign(step) : step));
  };
  return (
    <section className={styles.bar} aria-label="Evening" data-working={long || undefined}>
      {!still && (
        <button
          type="button"
          className={styles.play}
          aria-label={playing ? 'Pause the evening' : 'Play the evening'}
          title={playing ? 'Pause' : 'Play the evening'}
          onClick={() => (playing ? night.pause() : night.play())}
        >
          <svg viewBox="0 0 20 20" width="18" height="18" aria-hidden="true">
            {playing ? <path d="M5.5 4h3v12h-3zM11.5 4h3v12h-3z" /> : <path d="M6 3.8v12.4L16 10z" />}
          </svg>
        </button>
      )}
      <p className={styles.now}>
        <strong>{clock}</strong>
        <span role="status">{long && 'Working out the light…'}</span>
        {!long && (
          <span>
            {dayOf(evening)} · {phase} · {lights}
          </span>
        )}
      </p>
      <div className={styles.line}>
        <div ref={track} className={styles.track} style={{ backgroundImage: ground }}>
          {line.ticks.map((tick) => (
            <span
              key={`${tick.kind} ${tick.at.getTime()}`}
              className={styles.tick}
              style={{ insetInlineStart: `${shareOf(line, tick.at) * 100}%` }}
            />
          ))}
          <input
            type="range"
            className={styles.thumb}
            min={0}
            max={line.minutes}
            step={1}
            value={minutes}
            aria-label="Time of the evening"
            aria-valuetext={`${clock}, ${phase}, ${lights}`}
            onChange={(event) => night.seek(Number(event.target.value))}
            onKeyDown={onKeyDown}
          />
        </div>
        <div className={styles.lanes} aria-hidden="true">
          {line.lanes.map((lane) => (
            <span
              key={`${lane.on.getTime()} ${lane.off.getTime()}`}
              className={styles.lane}
              title={`${lane.zones.join(', ')}: ${clockText(lane.on, evening.timeZone, locale)} to ${clockText(lane.off, evening.timeZone, locale)}`}
            >
              <span
                style={{
                  insetInlineStart: `${shareOf(line, lane.on) * 100}%`,
                  inlineSize: `${(shareOf(line, lane.off) - shareOf(line, lane.on)) * 100}%`,
                }}
              />
            </span>
          ))}
        </div>
        <p className={styles.labels}>
          {labels.map(({ key, text, left }) => (
            <span key={key} style={{ insetInlineStart: left }}>
              {text}
            </span>
          ))}
        </p>
      </div>
      <PlaceNote />
    </section>
  );
}

/** "Dec 1": sunset is of a day of the year. */
function dayOf({ date: { year, month, day } }: Evening): string {
  const format = new Intl.DateTimeFormat(undefined, { day: 'numeric', month: 'short', timeZone: 'UTC' });
  return format.format(new Date(Date.UTC(year, month - 1, day)));
}

function stepOf(key: string): number {
  switch (key) {
    case 'ArrowRight':
    case 'ArrowUp':
      return NEAR_MINUTES;
    case 'ArrowLeft':
    case 'ArrowDown':
      return -NEAR_MINUTES;
    default:
      return 0;
  }
}

/** Says when the sunset is not that of the property, and where to set that right. */
function PlaceNote() {
  const { placeOf, placeTo } = useNightHere();
  const note = useNight((s) => s.evening.note);
  if (placeOf === 'property' && note === null) return null;
  const sentence = note ?? 'Sunset is that of the company’s place.';
  return (
    <p className={styles.place}>
      {sentence}{' '}
      {placeOf !== 'property' && placeTo !== null && <Link to={placeTo}>Set the property’s place</Link>}
    </p>
  );
}
