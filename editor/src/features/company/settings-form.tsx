import { scheduleSchema } from '@lampwright/geometry/plan';
import { z } from 'zod';
import {
  ChoiceField,
  FieldGroup,
  FieldRow,
  Form,
  LengthField,
  NumberField,
  TextField,
  useZodForm,
} from '../../components/form';
import { PlaceFields } from '../../components/place-fields';
import { ScheduleField } from '../../components/schedule-field';
import { showToast } from '../../components/toast';
import { isTimeZone } from '../../lib/time-zones';
import { useUnits } from '../../lib/units';
import { type Company, useEditCompany } from './api';
import { TimeZoneField } from './time-zone-field';

const length = z.number().min(0).max(100);
const volts = z.number().positive().max(60);
const aim = z
  .object({ minVolts: volts, maxVolts: volts })
  .refine(({ minVolts, maxVolts }) => minVolts < maxVolts, {
    error: 'The lower volts must be below the higher.',
    path: ['maxVolts'],
  });

/** Both of its numbers, or neither: then it is not known. */
const place = z
  .object({
    latitude: z.number().min(-90).max(90).nullable(),
    longitude: z.number().min(-180).max(180).nullable(),
  })
  .transform(({ latitude, longitude }, context) => {
    if (latitude === null && longitude === null) return null;
    if (latitude !== null && longitude !== null) return { latitude, longitude };
    const missing = latitude === null ? 'latitude' : 'longitude';
    context.addIssue({
      code: 'custom',
      path: [missing],
      message: 'A place needs both numbers. Fill this in, or clear the other.',
    });
    return z.NEVER;
  });

const schema = z.object({
  units: z.enum(['imperial', 'metric']),
  currency: z.string().regex(/^[A-Z]{3}$/, { error: 'A currency has three capital letters, such as USD.' }),
  lineVolts: z.number().positive().max(600),
  conductorTemperatureC: z.number().min(-60).max(120),
  slackAtFixtureMeters: length,
  slackAtTransformerMeters: length,
  slackAtJunctionMeters: length,
  waterClearanceMeters: length,
  transformerTargetPercent: z.number().min(1).max(100),
  schedule: scheduleSchema,
  timeZone: z.string().trim().refine(isTimeZone, {
    error: 'That is no time zone; one is written as Europe/London or America/New_York.',
  }),
  place,
  aim: z.object({ led: aim, halogen: aim }),
});

/** A tenth of a degree is far below what anybody knows of buried cable, and keeps 68 °F at 20 °C exactly. */
const tenth = (n: number) => Math.round(n * 10) / 10;
const fahrenheit = {
  show: (celsius: number) => tenth(celsius * 1.8 + 32),
  keep: (shown: number) => (shown - 32) / 1.8,
};

/** Pointers of the server name the settings within the company. */
const fieldOf = (name: string): string => name.replace(/^settings\./, '');

const nowhere = { latitude: null, longitude: null };
const startOf = (settings: z.output<typeof schema>): z.input<typeof schema> => ({
  ...settings,
  place: settings.place ?? nowhere,
});

/** What plans of this company begin with. A plan keeps its own values afterwards. */
export function SettingsForm({ company }: { company: Company }) {
  const edit = useEditCompany();
  const imperial = useUnits() === 'imperial';
  const start = startOf(company.settings);
  const form = useZodForm(schema, { defaultValues: start });
  const { control } = form;
  return (
    <Form
      form={form}
      label="Working values"
      submitLabel="Save working values"
      serverName={fieldOf}
      onSubmit={async (settings) => {
        await edit.mutateAsync({ settings });
        form.reset(startOf(settings));
        showToast({ message: 'Working values are saved. New plans begin with them.' });
      }}
    >
      <FieldGroup legend="Power">
        <FieldRow>
          <NumberField control={control} name="lineVolts" label="Line volts" unit="V" />
          <NumberField
            control={control}
            name="transformerTargetPercent"
            label="Load a transformer to"
            unit="% of its rating"
          />
        </FieldRow>
        <NumberField
          control={control}
          name="conductorTemperatureC"
          label="Temperature of the conductors"
          hint="Warmer copper resists more; buried cable stays near the ground's."
          unit={imperial ? '°F' : '°C'}
          scale={imperial ? fahrenheit : undefined}
        />
      </FieldGroup>
      <FieldGroup legend="What a designer aims at">
        <FieldRow>
          <NumberField control={control} name="aim.led.minVolts" label="LED, from" unit="V" />
          <NumberField control={control} name="aim.led.maxVolts" label="LED, to" unit="V" />
        </FieldRow>
        <FieldRow>
          <NumberField control={control} name="aim.halogen.minVolts" label="Halogen, from" unit="V" />
          <NumberField control={control} name="aim.halogen.maxVolts" label="Halogen, to" unit="V" />
        </FieldRow>
      </FieldGroup>
      <FieldGroup legend="Cable slack">
        <FieldRow>
          <LengthField control={control} name="slackAtTransformerMeters" label="At the transformer" />
          <LengthField control={control} name="slackAtFixtureMeters" label="At each fixture" />
          <LengthField control={control} name="slackAtJunctionMeters" label="At hubs and splices" />
        </FieldRow>
      </FieldGroup>
      <FieldGroup legend="Evenings">
        <ScheduleField
          control={control}
          name="schedule"
          label="Lights are usually on"
          hint="A plan begins with this; a transformer, a run or a zone of smart lamps may have its own."
        />
        <TimeZoneField control={control} name="timeZone" />
        <PlaceFields
          control={control}
          latitude="place.latitude"
          longitude="place.longitude"
          hint="Where the sun sets for properties whose own place is not written down."
        />
      </FieldGroup>
      <FieldGroup legend="Rules and money">
        <LengthField
          control={control}
          name="waterClearanceMeters"
          label="Least distance from water"
          hint="Nearer than this, the plan cautions. Local code decides."
        />
        <ChoiceField
          control={control}
          name="units"
          label="Units of proposals and sheets"
          options={[
            { value: 'imperial', label: 'Feet and inches' },
            { value: 'metric', label: 'Metres' },
          ]}
        />
        <TextField
          control={control}
          name="currency"
          label="Currency"
          hint="Three letters, such as USD."
          maxLength={3}
        />
      </FieldGroup>
    </Form>
  );
}
