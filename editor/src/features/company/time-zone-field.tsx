import { clockText } from '@lampwright/geometry/night';
import { useId } from 'react';
import { type Control, type FieldPath, type FieldValues, useWatch } from 'react-hook-form';
import { TextField } from '../../components/form';
import { isTimeZone, timeZoneNames } from '../../lib/time-zones';

interface TimeZoneFieldProps<In extends FieldValues, Out> {
  readonly control: Control<In, unknown, Out>;
  readonly name: FieldPath<In>;
}

const names = timeZoneNames();

/** Searched by typing part of a name; says what clocks there show, so that a wrong one is noticed. */
export function TimeZoneField<In extends FieldValues, Out>({ control, name }: TimeZoneFieldProps<In, Out>) {
  const id = useId();
  const zone: unknown = useWatch({ control, name });
  const hint =
    typeof zone === 'string' && isTimeZone(zone)
      ? `Clocks there show ${clockText(new Date(), zone, navigator.language)} now.`
      : 'Type a part of its name, such as London or New_York, and choose.';
  return (
    <>
      <TextField
        control={control}
        name={name}
        label="Time zone of the properties"
        hint={hint}
        autoComplete="off"
        maxLength={64}
        list={id}
      />
      <datalist id={id}>
        {names.map((each) => (
          <option key={each} value={each} />
        ))}
      </datalist>
    </>
  );
}
