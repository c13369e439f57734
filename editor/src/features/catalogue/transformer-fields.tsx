import { useFieldArray } from 'react-hook-form';
import { Button } from '../../components/button';
import {
  ChoiceField,
  FieldGroup,
  FieldRow,
  NumberField,
  SelectField,
  TextField,
} from '../../components/form';
import { PlusIcon } from '../../components/icons';
import styles from './catalogue.module.css';
import type { DraftTerminal } from './draft';
import type { ItemForm } from './light-fields';

export function TransformerFields({ form }: { form: ItemForm }) {
  const { control } = form;
  return (
    <>
      <FieldGroup legend="Rating">
        <FieldRow>
          <NumberField control={control} name="ratedVA" label="Rated" unit="VA" />
          <NumberField control={control} name="nominalLineVolts" label="For line volts of" unit="V" />
          <NumberField
            control={control}
            name="regulationPercent"
            label="Regulation"
            hint="How far its volts sag at full load."
            unit="%"
          />
        </FieldRow>
        <ChoiceField
          control={control}
          name="ratedAt"
          label="The volts on its taps are"
          options={[
            { value: 'open', label: 'with nothing on them' },
            { value: 'load', label: 'at full load' },
          ]}
        />
        <ChoiceField
          control={control}
          name="supply"
          label="Output"
          options={[
            { value: 'ac', label: 'AC' },
            { value: 'dc', label: 'DC' },
          ]}
        />
      </FieldGroup>
      <Windings form={form} />
      <Terminals form={form} />
    </>
  );
}

function Windings({ form }: { form: ItemForm }) {
  const { control } = form;
  const { fields, append, remove } = useFieldArray({ control, name: 'windings' });
  const several = fields.length > 1;
  return (
    <FieldGroup legend="Windings">
      {!several && (
        <p className="quiet">One winding carries the whole load. Add one where each common has its own.</p>
      )}
      {several &&
        fields.map((field, i) => (
          <div key={field.id} className={styles.terminal}>
            <FieldRow>
              <TextField control={control} name={`windings.${i}.id`} label="Winding" maxLength={24} />
              <NumberField control={control} name={`windings.${i}.ratedVA`} label="Rated" unit="VA" />
            </FieldRow>
            <div className={styles.rowActions}>
              <Button kind="bare" onClick={() => remove(i)}>
                Remove
              </Button>
            </div>
          </div>
        ))}
      <p>
        <Button
          onClick={() => append({ id: `W${fields.length + 1}`, ratedVA: null })}
          disabled={fields.length >= 8}
        >
          <PlusIcon />
          Add a winding
        </Button>
      </p>
    </FieldGroup>
  );
}

const nextTerminal = (type: DraftTerminal['type'], terminals: readonly DraftTerminal[], winding: string) => {
  const same = terminals.filter((terminal) => terminal.type === type);
  const highest = Math.max(11, ...same.map((terminal) => terminal.volts ?? 0));
  const next: DraftTerminal =
    type === 'tap'
      ? { type, id: `${highest + 1}V`, volts: highest + 1, winding, limitAmps: null, maxConductors: 3 }
      : { type, id: `C${same.length + 1}`, volts: null, winding, limitAmps: 25, maxConductors: 3 };
  return next;
};

function Terminals({ form }: { form: ItemForm }) {
  const { control } = form;
  const { fields, append, remove, move } = useFieldArray({ control, name: 'terminals' });
  const terminals = form.watch('terminals');
  const windings = form.watch('windings').map(({ id }) => ({ value: id, label: id }));
  const several = windings.length > 1;
  const add = (type: DraftTerminal['type']) =>
    append(nextTerminal(type, terminals, windings[0]?.value ?? ''));
  const fault = form.formState.errors.terminals?.root?.message ?? form.formState.errors.terminals?.message;
  return (
    <FieldGroup legend="Terminals, left to right as they sit on the unit">
      <p className="quiet">Holds: how many conductors fit. A limit left empty is none.</p>
      {fields.map((field, i) => {
        const tap = terminals[i]?.type === 'tap';
        const called = `${tap ? 'tap' : 'common'} ${terminals[i]?.id ?? ''}`;
        return (
          <div key={field.id} className={styles.terminal}>
            <div className={styles.terminalHead}>
              <strong>
                {i + 1}. {tap ? 'Tap' : 'Common'}
              </strong>
              <div className={styles.rowActions}>
                <Button
                  kind="bare"
                  disabled={i === 0}
                  aria-label={`Move ${called} left`}
                  onClick={() => move(i, i - 1)}
                >
                  Left
                </Button>
                <Button
                  kind="bare"
                  disabled={i === fields.length - 1}
                  aria-label={`Move ${called} right`}
                  onClick={() => move(i, i + 1)}
                >
                  Right
                </Button>
                <Button kind="bare" aria-label={`Remove ${called}`} onClick={() => remove(i)}>
                  Remove
                </Button>
              </div>
            </div>
            <FieldRow tight>
              <TextField control={control} name={`terminals.${i}.id`} label="Label" maxLength={24} />
              {tap && <NumberField control={control} name={`terminals.${i}.volts`} label="Volts" />}
              <NumberField control={control} name={`terminals.${i}.limitAmps`} label="Limit, A" />
              <NumberField control={control} name={`terminals.${i}.maxConductors`} label="Holds" />
              {several && (
                <SelectField
                  control={control}
                  name={`terminals.${i}.winding`}
                  label="Winding"
                  options={windings}
                />
              )}
            </FieldRow>
          </div>
        );
      })}
      {fault && <p role="alert">{fault}</p>}
      <div className={styles.rowActions}>
        <Button onClick={() => add('tap')} disabled={fields.length >= 32}>
          <PlusIcon />
          Add a tap
        </Button>
        <Button onClick={() => add('common')} disabled={fields.length >= 32}>
          <PlusIcon />
          Add a common
        </Button>
      </div>
    </FieldGroup>
  );
}
