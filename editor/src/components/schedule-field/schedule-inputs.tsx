import { scheduleInWords } from '@lampwright/geometry/night';
import { type Schedule, scheduleSchema } from '@lampwright/geometry/plan';
import { useId } from 'react';
import { sentenceFor } from '../../lib/zod-sentences';
import form from '../form/form.module.css';
import styles from './schedule-field.module.css';
import { SwitchTimeInput } from './switch-time-input';

/** What is wrong with each end of a schedule, as a sentence; null where nothing is. */
function faultsOf(schedule: Schedule): { on: string | null; off: string | null } {
  const parsed = scheduleSchema.safeParse(schedule, { error: (issue) => sentenceFor(issue) ?? null });
  const of = (end: 'on' | 'off') =>
    parsed.error?.issues.find((issue) => issue.path[0] === end)?.message ?? null;
  return { on: of('on'), off: of('off') };
}

export const isSchedule = (schedule: Schedule): boolean => scheduleSchema.safeParse(schedule).success;

/** Hours of the clock in the order of a night, which begins at noon. */
const nightly = (clock: string) => (clock < '12:00' ? `1${clock}` : `0${clock}`);

/** By the clock alone it can be told that a schedule never lights; by the sun that depends on the day. */
function neverLights({ on, off }: Schedule): boolean {
  return on.kind === 'clock' && off.kind === 'clock' && nightly(on.at) >= nightly(off.at);
}

interface ScheduleInputsProps {
  readonly value: Schedule;
  readonly onChange: (value: Schedule, settled: boolean) => void;
  readonly onSettle: () => void;
  readonly disabled: boolean;
}

/** The two ends of a schedule, and in words what they mean or what is wrong with them. */
export function ScheduleInputs({ value, onChange, onSettle, disabled }: ScheduleInputsProps) {
  const id = useId();
  const faults = faultsOf(value);
  const fault = faults.on ?? faults.off;
  const common = { onSettle, disabled };
  return (
    <>
      <SwitchTimeInput
        {...common}
        label="On"
        value={value.on}
        usualClock="19:00"
        invalid={faults.on !== null}
        describedBy={faults.on === null ? undefined : id}
        onChange={(on, settled) => onChange({ ...value, on }, settled)}
      />
      <SwitchTimeInput
        {...common}
        label="Off"
        value={value.off}
        usualClock="23:00"
        invalid={faults.off !== null}
        describedBy={faults.off === null ? undefined : id}
        onChange={(off, settled) => onChange({ ...value, off }, settled)}
      />
      {fault === null ? (
        <output className={styles.words}>
          {scheduleInWords(value)}.
          {neverLights(value) && ' Off comes before on: with these times the lights stay off.'}
        </output>
      ) : (
        <span id={id} className={form.error}>
          {fault}
        </span>
      )}
    </>
  );
}
