import { z } from 'zod';
import { AreaField, Form, TextField, useZodForm } from '../../components/form';
import { PlaceFields } from '../../components/place-fields';
import type { PropertyFields } from './api';

const schema = z
  .object({
    name: z.string().trim().min(1).max(120),
    address: z.string().trim().max(400),
    region: z.string().trim().max(80),
    accessNotes: z.string().trim().max(4000),
    latitude: z.number().min(-90).max(90).nullable(),
    longitude: z.number().min(-180).max(180).nullable(),
  })
  .superRefine(({ latitude, longitude }, context) => {
    if ((latitude === null) === (longitude === null)) return;
    context.addIssue({
      code: 'custom',
      path: [latitude === null ? 'latitude' : 'longitude'],
      message: 'A place needs both numbers. Fill this in, or clear the other.',
    });
  });

export const emptyProperty: PropertyFields = {
  name: '',
  address: '',
  region: '',
  accessNotes: '',
  latitude: null,
  longitude: null,
};

interface PropertyFormProps {
  readonly start: PropertyFields;
  readonly label: string;
  readonly submitLabel: string;
  readonly onSubmit: (fields: PropertyFields) => Promise<void>;
}

export function PropertyForm({ start, label, submitLabel, onSubmit }: PropertyFormProps) {
  const form = useZodForm(schema, { defaultValues: start });
  const { control } = form;
  return (
    <Form form={form} label={label} submitLabel={submitLabel} onSubmit={onSubmit}>
      <TextField control={control} name="name" label="What you call it" maxLength={120} />
      <TextField
        control={control}
        name="address"
        label="Address"
        autoComplete="off"
        maxLength={400}
        optional
      />
      <TextField
        control={control}
        name="region"
        label="Region"
        hint="State or county, where local code depends on it."
        maxLength={80}
        optional
      />
      <AreaField
        control={control}
        name="accessNotes"
        label="Getting in"
        hint="Gate, dog, where to park."
        rows={2}
        optional
      />
      <PlaceFields
        control={control}
        latitude="latitude"
        longitude="longitude"
        hint="Where the sun sets: the evenings of its plans and proposals follow it."
      />
    </Form>
  );
}
