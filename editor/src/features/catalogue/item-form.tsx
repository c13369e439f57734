import { type CatalogueCategory, type CatalogueItem, fixtureKinds } from '@lampwright/geometry/catalogue';
import { useForm } from 'react-hook-form';
import {
  AreaField,
  CheckField,
  ChoiceField,
  FieldGroup,
  FieldRow,
  Form,
  LengthField,
  NumberField,
  SelectField,
  TextField,
} from '../../components/form';
import { controlLabel, kindLabel, partItemUses, partUseLabel, technologyLabel } from './categories';
import { ConductorFields } from './conductor-fields';
import { type Draft, fieldOf } from './draft';
import { type ItemForm, LightFields } from './light-fields';
import { resolverFor } from './resolver';
import { TransformerFields } from './transformer-fields';

const kinds = fixtureKinds.map((value) => ({ value, label: kindLabel(value) }));
const technologies = (['led', 'halogen', 'incandescent'] as const).map((value) => ({
  value,
  label: technologyLabel(value),
}));
const controls = (['timer', 'photocell', 'smart-plug'] as const).map((value) => ({
  value,
  label: controlLabel(value),
}));
const uses = partItemUses.map((value) => ({ value, label: partUseLabel(value) }));

interface CatalogueFormProps {
  readonly category: CatalogueCategory;
  readonly start: Draft;
  readonly submitLabel: string;
  readonly onSubmit: (item: CatalogueItem) => Promise<void>;
}

export function CatalogueForm({ category, start, submitLabel, onSubmit }: CatalogueFormProps) {
  const form = useForm<Draft, unknown, CatalogueItem>({
    resolver: resolverFor(category),
    mode: 'onTouched',
    defaultValues: start,
  });
  const { control } = form;
  return (
    <Form
      form={form}
      label="Catalogue item"
      submitLabel={submitLabel}
      serverName={(name) => fieldOf(name.replace(/^item\./, ''), category)}
      onSubmit={onSubmit}
    >
      <TextField control={control} name="name" label="Name" maxLength={120} />
      <CategoryFields category={category} form={form} />
      <AreaField control={control} name="note" label="Note" rows={2} optional />
    </Form>
  );
}

function CategoryFields({ category, form }: { category: CatalogueCategory; form: ItemForm }) {
  const { control } = form;
  switch (category) {
    case 'fixture':
      return <FixtureFields form={form} />;
    case 'lamp':
      return (
        <>
          <FieldRow>
            <TextField
              control={control}
              name="base"
              label="Base"
              hint="Such as GU5.3 or G4."
              maxLength={24}
            />
            <SelectField control={control} name="technology" label="Technology" options={technologies} />
          </FieldRow>
          <LightFields form={form} />
          <NumberField control={control} name="lifeHours" label="Life" unit="h" optional />
        </>
      );
    case 'cable':
      return (
        <>
          <ConductorFields form={form} label="Conductor" />
          <NumberField control={control} name="ampacityAmps" label="Carries" unit="A" optional />
          <CheckField control={control} name="directBurial" label="Listed for direct burial" />
        </>
      );
    case 'transformer':
      return <TransformerFields form={form} />;
    case 'hub':
      return <NumberField control={control} name="ways" label="Ways" />;
    case 'connector':
      return (
        <>
          <FieldRow>
            <NumberField control={control} name="minConductors" label="Conductors, at least" />
            <NumberField control={control} name="maxConductors" label="Conductors, at most" />
          </FieldRow>
          <FieldRow>
            <NumberField control={control} name="smallestAwg" label="Thinnest" unit="AWG" />
            <NumberField control={control} name="largestAwg" label="Thickest" unit="AWG" />
          </FieldRow>
          <CheckField control={control} name="directBurial" label="Listed for direct burial" />
        </>
      );
    case 'control':
      return (
        <>
          <ChoiceField control={control} name="controlKind" label="Kind" options={controls} />
          <FieldRow>
            <NumberField control={control} name="ratedVA" label="Rated" unit="VA" />
            <NumberField control={control} name="inrushAmps" label="Inrush" unit="A" optional />
          </FieldRow>
        </>
      );
    case 'part':
      return (
        <SelectField
          control={control}
          name="use"
          label="What it is for"
          hint="Materials take stakes, mounts and conduit from here."
          options={uses}
        />
      );
  }
}

/** A tenth of a per cent is finer than anybody measures, and keeps 29 % at 29. */
const percent = {
  show: (share: number) => Math.round(share * 1000) / 10,
  keep: (shown: number) => shown / 100,
};

function FixtureFields({ form }: { form: ItemForm }) {
  const { control } = form;
  return (
    <>
      <SelectField control={control} name="kind" label="Kind" options={kinds} />
      <ChoiceField
        control={control}
        name="light"
        label="Its light"
        options={[
          { value: 'integrated', label: 'Built in' },
          { value: 'lamp', label: 'Takes a lamp' },
        ]}
      />
      {form.watch('light') === 'integrated' ? (
        <LightFields form={form} />
      ) : (
        <FieldRow>
          <TextField control={control} name="base" label="Base" hint="Such as GU5.3 or G4." maxLength={24} />
          <NumberField control={control} name="maxWatts" label="Lamp of at most" unit="W" optional />
        </FieldRow>
      )}
      <FieldGroup legend="Mounting">
        <ConductorFields form={form} label="Lead" />
        <FieldRow>
          <LengthField control={control} name="leadLengthMeters" label="Length of the lead" />
          <LengthField control={control} name="mountingHeightMeters" label="Height of the light" optional />
        </FieldRow>
        <NumberField
          control={control}
          name="shieldFactor"
          label="Held back outside of its beam"
          hint="By a hood, shield or louvre: 0 % holds back nothing, 100 % all that would glare."
          unit="%"
          scale={percent}
          optional
        />
        <CheckField
          control={control}
          name="wetListed"
          label="Listed for use in water"
          hint="Distances to pools and ponds then do not apply to it."
        />
      </FieldGroup>
    </>
  );
}
