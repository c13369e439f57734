import { conductorSchema } from '@lampwright/geometry/catalogue';
import { type FixtureRecord, itemOf, lightOf, setFields, setItem } from '@lampwright/geometry/plan';
import { fixtureLook, lookWord } from '../../../plan-view/fixture-look';
import { tagOf } from '../../../plan-view/names';
import { ampsText, voltAmpsText, voltsText } from '../../../plan-view/words';
import { gaugeText } from '../ledger/outline';
import { useDoc, useEditor, useEstimate } from '../page/context';
import { CommitField, LengthField, SelectField } from '../page/controls';
import { type CatalogueEntry, lampsFor, pickItems } from '../page/items';
import { AimFields } from './AimFields';
import styles from './inspector.module.css';
import { common, idsOf } from './shared';
import { WhereVoltsWent } from './WhereVoltsWent';
import { ZoneFields } from './ZoneFields';

interface Props {
  readonly fixtures: readonly FixtureRecord[];
  readonly entries: readonly CatalogueEntry[];
}

const leadGauges = [18, 16, 14, 12, 10] as const;

export function FixtureSection({ fixtures, entries }: Props) {
  const editor = useEditor();
  const doc = useDoc();
  const ids = idsOf(fixtures);
  const [first] = fixtures as [FixtureRecord];
  const one = fixtures.length === 1 ? first : null;
  const locked = !editor.canEdit;
  const itemId = common(fixtures, (f) => f.itemId);
  const item = itemOf(doc, itemId ?? null, 'fixture');
  const picks = pickItems(doc, entries, 'fixture');
  const current = itemId === undefined ? undefined : doc.get(itemId);
  const currentKey = current?.kind === 'item' ? (current.sourceId ?? current.id) : '';
  const lamps = pickItems(doc, entries, 'lamp');
  const fitting = item === undefined ? [] : lampsFor(item, lamps);
  const lampId = common(fixtures, (f) => f.lampId);
  const lamp = lampId === null || lampId === undefined ? undefined : doc.get(lampId);
  const lampKey = lamp?.kind === 'item' ? (lamp.sourceId ?? lamp.id) : '';
  const lead = common(fixtures, (f) => f.lead);
  const ownLead = lead ?? item?.lead ?? null;
  const known = (key: string, options: readonly { value: string; label: string }[], label: string) =>
    key === '' || options.some((o) => o.value === key) ? options : [{ value: key, label }, ...options];

  return (
    <>
      {one !== null ? <FixtureHead fixture={one} /> : <h2>{fixtures.length} fixtures</h2>}
      {one !== null && <WhereVoltsWent fixture={one} />}
      {one !== null && (
        <CommitField
          label="Name"
          inputId="inspector-name"
          value={one.name}
          maxLength={120}
          placeholder={item?.name}
          disabled={locked}
          commit={(name) => {
            editor.edit('Rename', (d) => setFields(d, ids, 'fixture', { name: name.trim() }));
            return null;
          }}
        />
      )}
      <SelectField
        label="Fixture"
        value={currentKey}
        mixed={itemId === undefined}
        disabled={locked}
        options={known(
          currentKey,
          picks.map((p) => ({ value: p.key, label: p.item.name })),
          item?.name ?? 'as it is',
        )}
        onChange={(key) => {
          const pick = picks.find((p) => p.key === key);
          if (pick !== undefined)
            editor.edit('Change fixture', (d) => setItem(d, ids, 'itemId', pick.choice));
        }}
      />
      {item?.light === 'lamp' && (
        <SelectField
          label="Lamp"
          value={lampKey}
          mixed={lampId === undefined}
          none={lampId === null ? 'No lamp yet' : undefined}
          disabled={locked}
          options={known(
            lampKey,
            fitting.map((l) => ({ value: l.key, label: l.item.name })),
            lamp?.kind === 'item' ? lamp.item.name : '',
          )}
          onChange={(key) => {
            const pick = fitting.find((l) => l.key === key);
            if (pick !== undefined) editor.edit('Change lamp', (d) => setItem(d, ids, 'lampId', pick.choice));
          }}
        />
      )}
      <CommitField
        label="Quantity"
        value={common(fixtures, (f) => f.quantity)?.toString() ?? ''}
        placeholder="several"
        inputMode="decimal"
        disabled={locked}
        commit={(text) => {
          const quantity = Number(text.trim());
          if (!Number.isInteger(quantity) || quantity < 1 || quantity > 1000)
            return 'A whole number from 1 to 1000.';
          editor.edit('Change quantity', (d) => setFields(d, ids, 'fixture', { quantity }));
          return null;
        }}
      />
      {ownLead !== null && (
        <>
          <LengthField
            label="Lead"
            value={ownLead.lengthMeters}
            disabled={locked}
            empty="null"
            hint={lead === null ? 'as it comes with the fixture' : undefined}
            commit={(length) =>
              editor.edit('Change lead', (d) =>
                setFields(d, ids, 'fixture', {
                  lead: length === null ? null : { conductor: ownLead.conductor, lengthMeters: length },
                }),
              )
            }
          />
          <SelectField
            label="Lead gauge"
            value={JSON.stringify(ownLead.conductor)}
            disabled={locked}
            options={known(
              JSON.stringify(ownLead.conductor),
              leadGauges.map((awg) => ({ value: JSON.stringify({ awg }), label: gaugeText({ awg }) })),
              gaugeText(ownLead.conductor),
            )}
            onChange={(value) => {
              const conductor = conductorSchema.parse(JSON.parse(value));
              editor.edit('Change lead', (d) =>
                setFields(d, ids, 'fixture', { lead: { conductor, lengthMeters: ownLead.lengthMeters } }),
              );
            }}
          />
        </>
      )}
      <AimFields fixtures={fixtures} />
      <ZoneFields fixtures={fixtures} />
      {one !== null && (
        <CommitField
          label="Note"
          value={one.note}
          maxLength={2000}
          disabled={locked}
          commit={(note) => {
            editor.edit('Write note', (d) => setFields(d, ids, 'fixture', { note }));
            return null;
          }}
        />
      )}
    </>
  );
}

/** The fixture's figures, in a sentence where something is wrong. */
function FixtureHead({ fixture }: { readonly fixture: FixtureRecord }) {
  const doc = useDoc();
  const reading = useEstimate((s) => s.answers?.fixtures.get(fixture.id));
  const unwired = useEstimate((s) => s.unwired.has(fixture.id));
  const stale = useEstimate((s) => s.stale);
  const light = lightOf(doc, fixture);
  const tag = tagOf(doc, fixture);
  if (unwired || reading === undefined)
    return (
      <>
        <h2>{tag}</h2>
        <p className={styles.facts}>{unwired ? 'Not wired yet.' : 'Its volts are not known yet.'}</p>
      </>
    );
  const window = light?.window ?? null;
  const look = fixtureLook(reading, window);
  const volts = voltsText(reading.volts, window);
  const heading =
    look.kind === 'dim'
      ? `${tag} is dim: ${volts}, rated from ${window?.minVolts.toFixed(1)} V`
      : look.kind === 'overdriven'
        ? `${tag} is overdriven: ${volts}, rated to ${window?.maxVolts.toFixed(1)} V`
        : look.kind === 'dark'
          ? `${tag} is dark: ${volts}`
          : `${tag}: ${volts}`;
  const aim =
    look.kind !== 'in-window' || light?.target == null
      ? ''
      : reading.aim === 'below' || reading.aim === 'above'
        ? ` Inside its rating, ${reading.aim} the aim of ${light.target.minVolts} to ${light.target.maxVolts} V.`
        : '';
  return (
    <>
      <h2>{heading}</h2>
      <p className={styles.facts} data-stale={stale || undefined}>
        {lookWord(look.kind)} · {ampsText(reading.amps)} · {voltAmpsText(reading.voltAmps)} ·{' '}
        {reading.dropPercent.toFixed(1)} % drop.{aim}
      </p>
    </>
  );
}
