import { conduitLengths } from '@lampwright/geometry/estimate';
import { type CableRecord, setFields, setItem } from '@lampwright/geometry/plan';
import { formatLengthWithError } from '@lampwright/geometry/units';
import { useMemo } from 'react';
import { percentText } from '../../../plan-view/words';
import { endsText } from '../ledger/outline';
import { useDoc, useEditor, useEstimate, useUnitSystem } from '../page/context';
import { CommitField, LengthField, SelectField } from '../page/controls';
import { type CatalogueEntry, pickItems } from '../page/items';
import { plainLength } from '../page/lengths';
import styles from './inspector.module.css';
import { common, idsOf } from './shared';

interface Props {
  readonly cables: readonly CableRecord[];
  readonly entries: readonly CatalogueEntry[];
}

export function CableSection({ cables, entries }: Props) {
  const editor = useEditor();
  const doc = useDoc();
  const ids = idsOf(cables);
  const one = cables.length === 1 ? cables[0]! : null;
  const locked = !editor.canEdit;
  const picks = pickItems(doc, entries, 'cable');
  const itemId = common(cables, (c) => c.itemId);
  const current = itemId === undefined ? undefined : doc.get(itemId);
  const key = current?.kind === 'item' ? (current.sourceId ?? current.id) : '';
  const options = picks.map((p) => ({ value: p.key, label: p.item.name }));
  const slackFrom = common(cables, (c) => c.slackFromMeters);
  const slackTo = common(cables, (c) => c.slackToMeters);
  const rise = common(cables, (c) => c.riseMeters);
  const usual = useUsualSlack(one);
  const measured = common(cables, (c) => c.measuredMeters);
  return (
    <>
      <h2>{one === null ? `${cables.length} cables` : `Cable ${endsText(doc, one)}`}</h2>
      {one !== null && <CableFacts cable={one} />}
      <SelectField
        label="Gauge"
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
          if (pick !== undefined) editor.edit('Change gauge', (d) => setItem(d, ids, 'itemId', pick.choice));
        }}
      />
      <LengthField
        label="Measured"
        value={measured ?? null}
        mixed={measured === undefined}
        empty="null"
        placeholder="as drawn"
        disabled={locked}
        commit={(measuredMeters) =>
          editor.edit('Measured length', (d) => setFields(d, ids, 'cable', { measuredMeters }))
        }
      />
      <LengthField
        label="Slack, start"
        value={slackFrom ?? null}
        mixed={slackFrom === undefined}
        empty="null"
        placeholder={usual.from}
        disabled={locked}
        commit={(slackFromMeters) =>
          editor.edit('Change slack', (d) => setFields(d, ids, 'cable', { slackFromMeters }))
        }
      />
      <LengthField
        label="Slack, end"
        value={slackTo ?? null}
        mixed={slackTo === undefined}
        empty="null"
        disabled={locked}
        placeholder={usual.to}
        commit={(slackToMeters) =>
          editor.edit('Change slack', (d) => setFields(d, ids, 'cable', { slackToMeters }))
        }
      />
      <LengthField
        label="Rise"
        value={rise ?? null}
        mixed={rise === undefined}
        disabled={locked}
        commit={(riseMeters) => {
          if (riseMeters !== null)
            editor.edit('Change rise', (d) => setFields(d, ids, 'cable', { riseMeters }));
        }}
      />
      <CommitField
        label="Splices"
        unit="Ω"
        value={common(cables, (c) => c.extraOhms)?.toString() ?? ''}
        placeholder="several"
        inputMode="decimal"
        disabled={locked}
        commit={(text) => {
          const extraOhms = Number(text.trim().replace(',', '.'));
          if (!Number.isFinite(extraOhms) || extraOhms < 0 || extraOhms > 1000) return 'Ohms from 0 to 1000.';
          editor.edit('Change splices', (d) => setFields(d, ids, 'cable', { extraOhms }));
          return null;
        }}
      />
    </>
  );
}

/** What the plan's settings leave over at that end, shown where the cable says nothing of its own. */
function useUsualSlack(cable: CableRecord | null): { readonly from: string; readonly to: string } {
  const system = useUnitSystem();
  const length = useEstimate((s) => (cable === null ? undefined : s.lengths.get(cable.id)));
  if (length === undefined) return { from: 'as the plan', to: 'as the plan' };
  return {
    from: plainLength(length.slackFromMeters, system),
    to: plainLength(length.slackToMeters, system),
  };
}

/** What the estimate counts, part by part, and what runs through it. */
function CableFacts({ cable }: { readonly cable: CableRecord }) {
  const system = useUnitSystem();
  const doc = useDoc();
  const conduit = useMemo(() => conduitLengths(doc).get(cable.id), [doc, cable.id]);
  const length = useEstimate((s) => s.lengths.get(cable.id));
  const reading = useEstimate((s) => s.answers?.cables.get(cable.id));
  if (length === undefined) return null;
  const slack = length.slackFromMeters + length.slackToMeters;
  const drawn =
    length.measuredMeters !== null
      ? `${plainLength(length.measuredMeters, system)} measured`
      : length.plan === null
        ? length.waitsFor === 'horizon'
          ? 'drawn above the horizon'
          : 'waits for the sheet’s scale'
        : `${formatLengthWithError(length.plan.meters, length.plan.sigmaMeters, { system })} drawn`;
  return (
    <>
      <p className={styles.facts}>
        {drawn} + {plainLength(slack, system)} slack + {plainLength(length.riseMeters, system)} rise ={' '}
        <strong>{plainLength(length.totalMeters, system)}</strong>
      </p>
      {conduit !== undefined && (
        <p className={styles.facts}>{plainLength(conduit, system)} of it runs under paving: conduit.</p>
      )}
      {length.plan !== null && !length.plan.trusted && length.measuredMeters === null && (
        <p className={styles.facts}>
          {length.plan.reason === 'near-horizon'
            ? 'It runs near the horizon, where the scale can’t be trusted: measure it on site.'
            : 'Its error is over 10 %, so the scale can’t be trusted here: measure it on site.'}
        </p>
      )}
      {reading !== undefined && (
        <p className={styles.facts}>
          {Math.abs(reading.amps).toFixed(1)} A
          {reading.ampacityPercent !== null &&
            ` · ${percentText(reading.ampacityPercent)} of what it carries`}{' '}
          · {Math.abs(reading.dropVolts).toFixed(2)} V lost · {reading.lossWatts.toFixed(1)} W
        </p>
      )}
    </>
  );
}
