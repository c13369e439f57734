import {
  type JunctionRecord,
  type MeasurementRecord,
  type NoteRecord,
  setFields,
} from '@lampwright/geometry/plan';
import { useEffect, useId, useState } from 'react';
import { useEditor, useScale, useUnitSystem } from '../page/context';
import { CommitField, SelectField } from '../page/controls';
import { lengthText } from '../page/lengths';
import { LightThis } from '../placing/LightThis';
import styles from './inspector.module.css';
import { LightTargetFields } from './LightTargetFields';
import { common, idsOf } from './shared';

export function JunctionSection({ junctions }: { readonly junctions: readonly JunctionRecord[] }) {
  const editor = useEditor();
  const ids = idsOf(junctions);
  const one = junctions.length === 1 ? junctions[0]! : null;
  const locked = !editor.canEdit;
  return (
    <>
      <h2>
        {one === null
          ? `${junctions.length} hubs and splices`
          : `${one.style === 'hub' ? 'Hub H' : 'Splice J'}${one.number}`}
      </h2>
      {one !== null && (
        <CommitField
          label="Name"
          inputId="inspector-name"
          value={one.name}
          maxLength={120}
          disabled={locked}
          commit={(name) => {
            editor.edit('Rename', (d) => setFields(d, ids, 'junction', { name: name.trim() }));
            return null;
          }}
        />
      )}
      <SelectField
        label="Is a"
        value={common(junctions, (j) => j.style) ?? ''}
        mixed={common(junctions, (j) => j.style) === undefined}
        disabled={locked}
        options={[
          { value: 'hub', label: 'Hub' },
          { value: 'splice', label: 'Splice' },
        ]}
        onChange={(style) =>
          editor.edit('Change joint', (d) =>
            setFields(d, ids, 'junction', { style: style === 'splice' ? 'splice' : 'hub', itemId: null }),
          )
        }
      />
    </>
  );
}

export function MeasurementSection({ measurement }: { readonly measurement: MeasurementRecord }) {
  const editor = useEditor();
  const scale = useScale();
  const system = useUnitSystem();
  return (
    <>
      <h2>Measurement</h2>
      <p className={styles.facts}>
        {lengthText(scale, measurement.points, system) || 'Its length waits for the sheet’s scale.'}
      </p>
      <LightTargetFields
        target={measurement.lightTarget}
        commit={(lightTarget) =>
          editor.edit('Change light wanted', (d) =>
            setFields(d, [measurement.id], 'measurement', { lightTarget }),
          )
        }
      />
      <LightThis record={measurement} />
    </>
  );
}

export function NoteSection({ note }: { readonly note: NoteRecord }) {
  const editor = useEditor();
  const id = useId();
  const [text, setText] = useState(note.text);
  useEffect(() => setText(note.text), [note.text]);
  return (
    <>
      <h2>
        <label htmlFor={id}>Note</label>
      </h2>
      <textarea
        id={id}
        className={styles.note}
        rows={4}
        maxLength={4000}
        value={text}
        disabled={!editor.canEdit}
        onChange={(event) => setText(event.target.value)}
        onBlur={() => {
          if (text !== note.text) editor.edit('Write note', (d) => setFields(d, [note.id], 'note', { text }));
        }}
      />
    </>
  );
}
