import { conduitLengths } from '@lampwright/geometry/estimate';
import {
  commonsOf,
  itemOf,
  type RunRecord,
  recordOf,
  recordsOf,
  setFields,
  setItem,
  setRunTerminals,
  tapsOf,
} from '@lampwright/geometry/plan';
import { meters } from '@lampwright/geometry/units';
import { useMemo } from 'react';
import { ampsText, voltAmpsText, voltsText } from '../../../plan-view/words';
import { useDoc, useEditor, useEstimate, useUnitSystem } from '../page/context';
import { CommitField, SelectField } from '../page/controls';
import { plainLength } from '../page/lengths';
import styles from './inspector.module.css';
import { RunSwitch } from './SwitchSections';

export function RunSection({ runs }: { readonly runs: readonly RunRecord[] }) {
  const [one] = runs;
  if (one === undefined || runs.length > 1) return <h2>{runs.length} runs</h2>;
  return <OneRun run={one} />;
}

function OneRun({ run }: { readonly run: RunRecord }) {
  const editor = useEditor();
  const doc = useDoc();
  const reading = useEstimate((s) => s.answers?.runs.get(run.id));
  const transformer = recordOf(doc, run.transformerId, 'transformer');
  const item = transformer && itemOf(doc, transformer.itemId, 'transformer');
  const locked = !editor.canEdit;
  const cables = [...recordsOf(doc, 'cable')].filter((c) => c.runId === run.id);
  const system = useUnitSystem();
  const conduits = useMemo(() => conduitLengths(doc), [doc]);
  const conduit = cables.reduce((sum, cable) => sum + (conduits.get(cable.id) ?? 0), 0);
  const own = [...recordsOf(doc, 'item')].filter((r) => r.item.category === 'cable');
  const gauges = new Set(cables.map((c) => c.itemId));
  return (
    <>
      <h2>Run {run.number}</h2>
      {reading !== undefined && (
        <p className={styles.facts}>
          {voltsText(reading.terminalVolts, null)} at the terminals · {ampsText(reading.amps)} ·{' '}
          {voltAmpsText(reading.voltAmps)}
          {reading.lowestVolts !== null &&
            reading.highestVolts !== null &&
            ` · fixtures from ${voltsText(reading.lowestVolts, null)} to ${voltsText(reading.highestVolts, null)}`}
        </p>
      )}
      {conduit > 0 && (
        <p className={styles.facts}>
          {plainLength(meters(conduit), system)} of its cable runs under paving: conduit.
        </p>
      )}
      <CommitField
        label="Name"
        inputId="inspector-name"
        value={run.name}
        maxLength={120}
        disabled={locked}
        commit={(name) => {
          editor.edit('Rename run', (d) => setFields(d, [run.id], 'run', { name: name.trim() }));
          return null;
        }}
      />
      {item !== undefined && (
        <>
          <SelectField
            label="Tap"
            value={run.tapId}
            disabled={locked}
            options={tapsOf(item).map((t) => ({ value: t.id, label: `${t.id} · ${t.volts} V` }))}
            onChange={(tapId) => editor.edit('Change tap', (d) => setRunTerminals(d, run.id, { tapId }))}
          />
          <SelectField
            label="Common"
            value={run.commonId}
            disabled={locked}
            options={commonsOf(item).map((t) => ({ value: t.id, label: t.id }))}
            onChange={(commonId) =>
              editor.edit('Change common', (d) => setRunTerminals(d, run.id, { commonId }))
            }
          />
        </>
      )}
      {cables.length > 0 && (
        <SelectField
          label="All its cable"
          value={gauges.size === 1 ? [...gauges][0]! : ''}
          mixed={gauges.size > 1}
          disabled={locked}
          options={own.map((r) => ({ value: r.id, label: r.item.name }))}
          onChange={(itemId) =>
            editor.edit('Change gauge', (d) =>
              setItem(
                d,
                cables.map((c) => c.id),
                'itemId',
                { itemId },
              ),
            )
          }
        />
      )}
      <RunSwitch run={run} />
    </>
  );
}
