import type { SwitchTime } from '@lampwright/geometry/plan';
import { useId, useState } from 'react';
import form from '../form/form.module.css';
import { Select } from '../select';
import styles from './schedule-field.module.css';

/** By the sun with a number of minutes that is never below nothing, or by the clock. */
const moments = [
  ['sunset-at', 'At sunset'],
  ['sunset-before', 'Before sunset'],
  ['sunset-after', 'After sunset'],
  ['sunrise-at', 'At sunrise'],
  ['sunrise-before', 'Before sunrise'],
  ['sunrise-after', 'After sunrise'],
  ['clock', 'At a clock time'],
] as const;
type Moment = (typeof moments)[number][0];

interface Typed {
  readonly moment: Moment;
  readonly minutes: string;
  readonly clock: string;
}

const USUAL_MINUTES = '30';

function typedOf(time: SwitchTime, usualClock: string): Typed {
  if (time.kind === 'clock') return { moment: 'clock', minutes: USUAL_MINUTES, clock: time.at };
  const { kind, minutesAfter } = time;
  if (minutesAfter === 0) return { moment: `${kind}-at`, minutes: USUAL_MINUTES, clock: usualClock };
  const side = minutesAfter < 0 ? 'before' : 'after';
  return { moment: `${kind}-${side}`, minutes: String(Math.abs(minutesAfter)), clock: usualClock };
}

/** What was typed; NaN minutes, which the schema refuses, for what is no whole number. */
function meaningOf({ moment, minutes, clock }: Typed): SwitchTime {
  if (moment === 'clock') return { kind: 'clock', at: clock };
  const [kind, side] = moment.split('-') as ['sunset' | 'sunrise', 'at' | 'before' | 'after'];
  if (side === 'at') return { kind, minutesAfter: 0 };
  const count = /^\s*\d{1,4}\s*$/.test(minutes) ? Number(minutes) : Number.NaN;
  return { kind, minutesAfter: side === 'before' ? 0 - count : count };
}

const same = (a: SwitchTime, b: SwitchTime) => JSON.stringify(a) === JSON.stringify(b);

interface SwitchTimeInputProps {
  /** "On" or "Off". */
  readonly label: string;
  readonly value: SwitchTime;
  /** A choice from the list is settled at once, what is typed when the field is left. */
  readonly onChange: (value: SwitchTime, settled: boolean) => void;
  readonly onSettle: () => void;
  readonly usualClock: string;
  readonly invalid: boolean;
  readonly describedBy: string | undefined;
  readonly disabled: boolean;
}

export function SwitchTimeInput(props: SwitchTimeInputProps) {
  const { label, value, onChange, onSettle, usualClock, invalid, describedBy, disabled } = props;
  const id = useId();
  const [kept, setTyped] = useState(() => typedOf(value, usualClock));
  // A value that did not come from these fields replaces what was typed.
  const typed = same(meaningOf(kept), value) ? kept : typedOf(value, usualClock);
  const change = (next: Partial<Typed>, settled: boolean) => {
    const now = { ...typed, ...next };
    setTyped(now);
    onChange(meaningOf(now), settled);
  };
  const common = {
    disabled,
    'aria-invalid': invalid || undefined,
    'aria-describedby': describedBy,
  };
  return (
    <div className={styles.time}>
      <label htmlFor={id} className={styles.timeLabel}>
        {label}
      </label>
      <Select
        id={id}
        disabled={disabled}
        aria-describedby={describedBy}
        value={typed.moment}
        onChange={(event) => change({ moment: event.target.value as Moment }, true)}
      >
        {moments.map(([moment, words]) => (
          <option key={moment} value={moment}>
            {words}
          </option>
        ))}
      </Select>
      {typed.moment === 'clock' ? (
        <input
          {...common}
          type="time"
          aria-label={`${label}: time`}
          className={`${form.input} ${styles.clock}`}
          value={typed.clock}
          onChange={(event) => change({ clock: event.target.value }, false)}
          onBlur={onSettle}
        />
      ) : (
        !typed.moment.endsWith('-at') && (
          <span className={form.control}>
            <input
              {...common}
              type="text"
              inputMode="numeric"
              autoComplete="off"
              aria-label={`${label}: minutes`}
              className={`${form.input} ${form.number} ${styles.minutes}`}
              value={typed.minutes}
              onChange={(event) => change({ minutes: event.target.value }, false)}
              onBlur={onSettle}
            />
            <span className={form.unit}>min</span>
          </span>
        )
      )}
    </div>
  );
}
