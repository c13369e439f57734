import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import { beamFromLumens } from '@lampwright/geometry/light';
import {
  CheckField,
  FieldGroup,
  FieldRow,
  NumberField,
  SelectField,
  type ZodForm,
} from '../../components/form';
import type { Draft } from './draft';

export type ItemForm = ZodForm<Draft, CatalogueItem>;

const loadKinds = [
  { value: 'driver', label: 'LED driver: constant power' },
  { value: 'filament', label: 'Filament: halogen or incandescent' },
  { value: 'resistive', label: 'Resistive' },
  { value: 'current', label: 'Constant current' },
  { value: 'off', label: 'Draws nothing' },
] as const;

/** Candela that lumens over a beam make; null where they don't yet say. */
function peakFrom(lumens: number | null, beamDegrees: number | null): number | null {
  if (lumens === null || beamDegrees === null || !(lumens > 0) || !(beamDegrees > 0)) return null;
  return Math.round(beamFromLumens(lumens, Math.min(beamDegrees, 360)).peakCandela);
}

/** What a light source draws, what it stands, and the light it gives. */
export function LightFields({ form }: { form: ItemForm }) {
  const { control } = form;
  const load = form.watch('loadKind');
  const hasAim = form.watch('hasAim');
  const peak = peakFrom(form.watch('lumens'), form.watch('beamDegrees'));
  return (
    <>
      <FieldGroup legend="What it draws">
        <SelectField control={control} name="loadKind" label="Kind of load" options={loadKinds} />
        {(load === 'driver' || load === 'filament' || load === 'resistive') && (
          <FieldRow>
            <NumberField control={control} name="watts" label="Power" unit="W" />
            {load === 'driver' ? (
              <NumberField control={control} name="powerFactor" label="Power factor" optional />
            ) : (
              <NumberField control={control} name="ratedVolts" label="At" unit="V" />
            )}
          </FieldRow>
        )}
        {load === 'driver' && (
          <NumberField
            control={control}
            name="loadMinVolts"
            label="Its driver starts at"
            hint="Below this it stays dark."
            unit="V"
          />
        )}
        {load === 'current' && <NumberField control={control} name="amps" label="Current" unit="A" />}
      </FieldGroup>
      <FieldGroup legend="Volts">
        <FieldRow>
          <NumberField control={control} name="windowMin" label="Rated from" unit="V" />
          <NumberField control={control} name="windowMax" label="Rated to" unit="V" />
        </FieldRow>
        <CheckField
          control={control}
          name="hasAim"
          label="Aim at a narrower window"
          hint="Outside its rating is a fault; outside the aim is advice."
        />
        {hasAim && (
          <FieldRow>
            <NumberField control={control} name="aimMin" label="Aim from" unit="V" />
            <NumberField control={control} name="aimMax" label="Aim to" unit="V" />
          </FieldRow>
        )}
      </FieldGroup>
      <FieldGroup legend="Light">
        <FieldRow>
          <NumberField control={control} name="lumens" label="Output" unit="lm" optional />
          <NumberField control={control} name="beamDegrees" label="Beam spread" unit="°" optional />
          <NumberField control={control} name="cctKelvin" label="Colour" unit="K" optional />
        </FieldRow>
        <NumberField
          control={control}
          name="peakCandela"
          label="In the middle of the beam"
          hint={
            peak === null
              ? 'As the maker measured it. Left empty, it follows from output and beam spread.'
              : `As the maker measured it. Left empty, it follows from output and beam spread: about ${peak} cd.`
          }
          unit="cd"
          placeholder={peak === null ? undefined : String(peak)}
          optional
        />
        <CheckField
          control={control}
          name="smart"
          label="Switched by itself (smart)"
          hint="Can be put in a zone of its own, apart from what else hangs on its feed."
        />
      </FieldGroup>
    </>
  );
}
