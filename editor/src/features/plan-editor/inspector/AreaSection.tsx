import { edgeLengths } from '@lampwright/geometry/measure';
import { type AreaRecord, areaUses, setFields } from '@lampwright/geometry/plan';
import { areaMeaning, areaWord, hasHeight } from '../page/area-words';
import { useEditor, useScale, useUnitSystem } from '../page/context';
import { CommitField, LengthField, SelectField } from '../page/controls';
import { areaText, groundOf, plainLength } from '../page/lengths';
import styles from './inspector.module.css';
import { LightTargetFields } from './LightTargetFields';
import { common, idsOf } from './shared';

/** More edges than this are a freehand outline: then only their sum is told. */
const MOST_EDGES = 8;

export function AreaSection({ areas }: { readonly areas: readonly AreaRecord[] }) {
  const editor = useEditor();
  const scale = useScale();
  const system = useUnitSystem();
  const ids = idsOf(areas);
  const one = areas.length === 1 ? areas[0]! : null;
  const locked = !editor.canEdit;
  const use = common(areas, (a) => a.use);
  const ground = one === null ? null : groundOf(scale, one.points);
  const edges = ground === null ? [] : edgeLengths(ground);
  return (
    <>
      <h2>{one === null ? `${areas.length} areas` : one.name || areaWord(one.use)}</h2>
      {one !== null && (
        <p className={styles.facts}>
          {ground === null
            ? 'Its size waits for the sheet’s scale.'
            : [
                areaText(scale, one.points, system),
                edges.length <= MOST_EDGES
                  ? `edges ${edges.map((e) => plainLength(e, system)).join(', ')}`
                  : `${plainLength(
                      edges.reduce((s, e) => s + e, 0),
                      system,
                    )} around`,
              ].join(' · ')}
          {areaMeaning(one.use) !== '' && ` ${areaMeaning(one.use)}`}
        </p>
      )}
      {one !== null && (
        <CommitField
          label="Name"
          inputId="inspector-name"
          value={one.name}
          maxLength={120}
          placeholder={areaWord(one.use)}
          disabled={locked}
          commit={(name) => {
            editor.edit('Rename area', (d) => setFields(d, ids, 'area', { name: name.trim() }));
            return null;
          }}
        />
      )}
      <SelectField
        label="Is"
        value={use ?? ''}
        mixed={use === undefined}
        disabled={locked}
        options={areaUses.map((u) => ({ value: u, label: areaWord(u) }))}
        onChange={(value) => {
          const next = areaUses.find((u) => u === value);
          if (next !== undefined) editor.edit('Change area', (d) => setFields(d, ids, 'area', { use: next }));
        }}
      />
      {use !== undefined && hasHeight(use) && (
        <LengthField
          label="Height"
          value={common(areas, (a) => a.heightMeters) ?? null}
          empty="null"
          placeholder="not known"
          disabled={locked}
          commit={(heightMeters) =>
            editor.edit('Change height', (d) => setFields(d, ids, 'area', { heightMeters }))
          }
        />
      )}
      {use !== 'lot-line' && use !== 'building' && (
        <LightTargetFields
          target={areas[0]?.lightTarget ?? null}
          mixed={common(areas, (a) => JSON.stringify(a.lightTarget)) === undefined}
          commit={(lightTarget) =>
            editor.edit('Change light wanted', (d) => setFields(d, ids, 'area', { lightTarget }))
          }
        />
      )}
    </>
  );
}
