import { useState } from 'react';
import { type Control, type FieldPath, type FieldValues, useController } from 'react-hook-form';
import { Button } from '../button';
import { FieldRow, NumberField } from '../form';
import { Problem } from '../states';
import { devicePlace } from './device-place';
import styles from './place-fields.module.css';

interface PlaceFieldsProps<In extends FieldValues, Out> {
  readonly control: Control<In, unknown, Out>;
  readonly latitude: FieldPath<In>;
  readonly longitude: FieldPath<In>;
  /** What the place is needed for. */
  readonly hint: string;
}

/** Degrees north and east, typed or taken from the device. */
export function PlaceFields<In extends FieldValues, Out>(props: PlaceFieldsProps<In, Out>) {
  const { control, latitude, longitude, hint } = props;
  const north = useController({ control, name: latitude }).field;
  const east = useController({ control, name: longitude }).field;
  const [state, setState] = useState<'idle' | 'asking' | 'taken' | { error: string }>('idle');
  const take = async () => {
    setState('asking');
    try {
      const place = await devicePlace(navigator.geolocation);
      north.onChange(place.latitude);
      east.onChange(place.longitude);
      setState('taken');
    } catch (error) {
      setState({ error: (error as Error).message });
    }
  };
  return (
    <div className={styles.place}>
      <FieldRow>
        <NumberField control={control} name={latitude} label="Latitude" unit="° north" optional />
        <NumberField control={control} name={longitude} label="Longitude" unit="° east" optional />
      </FieldRow>
      <p className={styles.hint}>{hint} West of Greenwich and south of the equator are below zero.</p>
      <div className={styles.take}>
        <Button busy={state === 'asking'} onClick={take}>
          Use this device’s place
        </Button>
        <span role="status" className={styles.hint}>
          {state === 'asking' && 'Asking the device…'}
          {state === 'taken' && 'Taken from this device; not saved yet.'}
        </span>
      </div>
      {typeof state === 'object' && <Problem error={state.error} />}
    </div>
  );
}
