import { transformerCautions } from '@lampwright/geometry/cautions';
import { itemOf, setFields, setItem, type TransformerRecord } from '@lampwright/geometry/plan';
import { useMe } from '../../../lib/me';
import { percentText, voltAmpsText } from '../../../plan-view/words';
import { useDoc, useEditor, useEstimate } from '../page/context';
import { CommitField, SelectField } from '../page/controls';
import { type CatalogueEntry, transformerPicks } from '../page/items';
import styles from './inspector.module.css';
import { TransformerTimes } from './SwitchSections';
import { common, idsOf } from './shared';

interface Props {
  readonly transformers: readonly TransformerRecord[];
  readonly entries: readonly CatalogueEntry[];
}

export function TransformerSection({ transformers, entries }: Props) {
  const editor = useEditor();
  const doc = useDoc();
  const answers = useEstimate((s) => s.answers);
  const ids = idsOf(transformers);
  const one = transformers.length === 1 ? transformers[0]! : null;
  const locked = !editor.canEdit;
  const device = useMe().company?.words.protectiveDevice ?? 'GFCI';
  const picks = transformerPicks(doc, entries);
  const itemId = common(transformers, (t) => t.itemId);
  const current = itemId === undefined ? undefined : doc.get(itemId);
  const key = current?.kind === 'item' ? (current.sourceId ?? current.id) : '';
  const options = picks.map((p) => ({ value: p.key, label: p.item.name }));
  const item = itemOf(doc, itemId ?? null, 'transformer');
  const reading = one === null ? undefined : answers?.transformers.get(one.id);
  return (
    <>
      <h2>{one === null ? `${transformers.length} transformers` : `Transformer T${one.number}`}</h2>
      {item !== undefined && one !== null && (
        <p className={styles.facts}>
          {reading === undefined
            ? `${voltAmpsText(item.ratedVA)}, nothing on it yet.`
            : `${voltAmpsText(reading.voltAmps)} of ${voltAmpsText(item.ratedVA)}: ${percentText(reading.loadPercent)}. ${
                reading.loadPercent > 100
                  ? 'Over its rating.'
                  : reading.loadPercent > 80
                    ? 'Over the 80 % to load it to.'
                    : 'Room for more.'
              }`}
        </p>
      )}
      {one !== null && (
        <CommitField
          label="Name"
          inputId="inspector-name"
          value={one.name}
          maxLength={120}
          placeholder="where it hangs"
          disabled={locked}
          commit={(name) => {
            editor.edit('Rename transformer', (d) => setFields(d, ids, 'transformer', { name: name.trim() }));
            return null;
          }}
        />
      )}
      <SelectField
        label="Transformer"
        value={key}
        mixed={itemId === undefined}
        disabled={locked}
        options={
          key === '' || options.some((o) => o.value === key)
            ? options
            : [{ value: key, label: current?.kind === 'item' ? current.item.name : '' }, ...options]
        }
        onChange={(value) => {
          const pick = picks.find((p) => p.key === value);
          if (pick !== undefined)
            editor.edit('Change transformer', (d) => setItem(d, ids, 'itemId', pick.choice));
        }}
      />
      <CommitField
        label="Line volts"
        unit="V"
        value={common(transformers, (t) => t.lineVolts)?.toString() ?? ''}
        placeholder="as the plan"
        inputMode="decimal"
        disabled={locked}
        hint="At its outlet, under load."
        commit={(text) => {
          if (text.trim() === '') {
            editor.edit('Change line volts', (d) => setFields(d, ids, 'transformer', { lineVolts: null }));
            return null;
          }
          const lineVolts = Number(text.trim().replace(',', '.'));
          if (!Number.isFinite(lineVolts) || lineVolts <= 0 || lineVolts > 600) return 'Volts from 1 to 600.';
          editor.edit('Change line volts', (d) => setFields(d, ids, 'transformer', { lineVolts }));
          return null;
        }}
      />
      <TransformerTimes transformers={transformers} />
      {one !== null && (
        <CommitField
          label="Note"
          value={one.note}
          maxLength={2000}
          disabled={locked}
          commit={(note) => {
            editor.edit('Write note', (d) => setFields(d, ids, 'transformer', { note }));
            return null;
          }}
        />
      )}
      {transformerCautions(device).map((caution) => (
        <p key={caution} className={styles.facts}>
          {caution}
        </p>
      ))}
    </>
  );
}
