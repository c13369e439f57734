import { controlZonesOf } from '@lampwright/geometry/light';
import {
  addZone,
  type FixtureRecord,
  lightOf,
  type PlanDocument,
  recordOf,
  recordsOf,
  setFields,
  settingsOf,
} from '@lampwright/geometry/plan';
import { useMemo } from 'react';
import { useDoc, useEditor } from '../page/context';
import { CommitField, SelectField } from '../page/controls';
import styles from './inspector.module.css';
import { common, idsOf } from './shared';

/** Not the id of any record. */
const NEW_ZONE = '+';

/** What fixtures are switched with: smart lights have a zone to choose, all others their feed to be told. */
export function ZoneFields({ fixtures }: { readonly fixtures: readonly FixtureRecord[] }) {
  const editor = useEditor();
  const doc = useDoc();
  const { zones, zoneOf } = useMemo(() => controlZonesOf(doc), [doc]);
  const locked = !editor.canEdit;
  const smart = fixtures.filter((f) => lightOf(doc, f)?.smart === true || f.zoneId !== null);
  const plain = fixtures.filter((f) => !smart.includes(f));
  const zoneId = common(smart, (f) => f.zoneId);
  const zone = recordOf(doc, zoneId ?? null, 'zone');
  const ids = idsOf(smart);
  const names = new Set(plain.map((f) => zones.find((z) => z.id === zoneOf.get(f.id))).map(switchWords));
  return (
    <fieldset className={styles.part}>
      <legend>Switching</legend>
      {plain.length > 0 && (
        <p className={styles.facts}>
          {smart.length > 0 && `${plain.length} of these: `}
          {names.size === 1 ? [...names][0] : 'switched with different feeds.'}
        </p>
      )}
      {smart.length > 0 && (
        <SelectField
          label="Zone"
          value={zoneId ?? ''}
          mixed={zoneId === undefined}
          none="With the feed"
          disabled={locked}
          options={[
            ...[...recordsOf(doc, 'zone')].map((z) => ({ value: z.id, label: z.name })),
            { value: NEW_ZONE, label: 'A new zone' },
          ]}
          onChange={(value) => {
            if (value === NEW_ZONE)
              editor.edit('Make zone', (d) =>
                addZone(d, { name: nextZoneName(d), schedule: settingsOf(d).schedule }, ids),
              );
            else
              editor.edit('Change zone', (d) =>
                setFields(d, ids, 'fixture', { zoneId: value === '' ? null : value }),
              );
          }}
        />
      )}
      {zone !== undefined && (
        <CommitField
          label="Zone’s name"
          value={zone.name}
          maxLength={120}
          disabled={locked}
          commit={(name) => {
            if (name.trim() === '') return 'Give the zone a name.';
            editor.edit('Rename zone', (d) => setFields(d, [zone.id], 'zone', { name: name.trim() }));
            return null;
          }}
        />
      )}
    </fieldset>
  );
}

function switchWords(zone: { readonly kind: 'feed' | 'run' | 'smart'; readonly name: string } | undefined) {
  switch (zone?.kind) {
    case undefined:
      return 'Nothing feeds it yet.';
    case 'feed':
      return zone.name === 'Not wired yet'
        ? 'Not wired yet: the wiring will say.'
        : `Switched with ${zone.name}.`;
    case 'run':
      return `Switched with ${zone.name}, which has a switch of its own.`;
    case 'smart':
      return `Switched with ${zone.name}.`;
  }
}

/** A name that no zone has yet. */
export function nextZoneName(doc: PlanDocument): string {
  const taken = new Set([...recordsOf(doc, 'zone')].map((z) => z.name));
  let n = 1;
  while (taken.has(`Zone ${n}`)) n++;
  return `Zone ${n}`;
}
