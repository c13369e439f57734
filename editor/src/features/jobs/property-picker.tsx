import { useQuery } from '@tanstack/react-query';
import { useId } from 'react';
import { type Control, useController } from 'react-hook-form';
import { Problem, SkeletonRows } from '../../components/states';
import { propertiesQuery } from '../../lib/clients';
import type { NewJobForm } from './new-job';
import styles from './pickers.module.css';

interface PropertyPickerProps {
  readonly control: Control<NewJobForm, unknown, NewJobForm>;
  readonly clientId: string;
}

/** One of the client's properties. */
export function PropertyPicker({ control, clientId }: PropertyPickerProps) {
  const group = useId();
  const { field, fieldState } = useController({ control, name: 'propertyId' });
  const properties = useQuery(propertiesQuery(clientId));
  return (
    <fieldset className={styles.picker}>
      <legend className="visually-hidden">Property</legend>
      {properties.isPending && <SkeletonRows rows={2} label="Loading properties" />}
      {properties.isError && <Problem error={properties.error} onRetry={() => properties.refetch()} />}
      {properties.data?.length === 0 && (
        <p className="quiet">This client has no property yet: choose “New property”.</p>
      )}
      <div className={styles.options}>
        {properties.data?.map((property) => (
          <label key={property.id} className={styles.option}>
            <input
              type="radio"
              name={group}
              checked={field.value === property.id}
              onChange={() => field.onChange(property.id)}
            />
            <span>
              {property.name}
              {property.address && <small>{property.address}</small>}
            </span>
          </label>
        ))}
      </div>
      {fieldState.error && (
        <p className={styles.error} role="alert">
          {fieldState.error.message}
        </p>
      )}
    </fieldset>
  );
}
