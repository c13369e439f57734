import { type FaceRecord, type PlanPoint, setFields, type TreeRecord } from '@lampwright/geometry/plan';
import { useEditor, useScale, useUnitSystem } from '../page/context';
import { CommitField, LengthField } from '../page/controls';
import { lengthText, plainLength } from '../page/lengths';
import { LightThis } from '../placing/LightThis';
import { upperEdge } from '../tools/uprights';
import styles from './inspector.module.css';
import { PointsField } from './PointsField';
import { common, idsOf, tooHigh } from './shared';

export function FaceSection({ faces }: { readonly faces: readonly FaceRecord[] }) {
  const editor = useEditor();
  const ids = idsOf(faces);
  const one = faces.length === 1 ? faces[0]! : null;
  const locked = !editor.canEdit;
  const height = common(faces, (f) => f.heightMeters);
  return (
    <>
      <h2>{one === null ? `${faces.length} wall faces` : one.name || 'Wall face'}</h2>
      {one !== null && <FaceFacts face={one} />}
      {one !== null && (
        <CommitField
          label="Name"
          inputId="inspector-name"
          value={one.name}
          maxLength={120}
          placeholder="Wall face"
          disabled={locked}
          commit={(name) => {
            editor.edit('Rename wall face', (d) => setFields(d, ids, 'face', { name: name.trim() }));
            return null;
          }}
        />
      )}
      <LengthField
        label="Height"
        value={height ?? null}
        mixed={height === undefined}
        disabled={locked}
        check={(meters) => (meters === 0 ? 'A height of zero stops no light.' : tooHigh(meters))}
        commit={(heightMeters) => {
          if (heightMeters !== null)
            editor.edit('Change height', (d) => setFields(d, ids, 'face', { heightMeters }));
        }}
      />
      {one !== null && <LightThis record={one} />}
      {one !== null && <FacePoints face={one} />}
    </>
  );
}

function FaceFacts({ face }: { readonly face: FaceRecord }) {
  const scale = useScale();
  const system = useUnitSystem();
  const length = lengthText(scale, face.foot, system);
  return (
    <p className={styles.facts}>
      {length === '' ? 'Its length waits for the sheet’s scale.' : `${length} long.`} Light climbs it, and
      none goes through.
    </p>
  );
}

function FacePoints({ face }: { readonly face: FaceRecord }) {
  const editor = useEditor();
  const locked = !editor.canEdit;
  const { foot, top } = face;
  const set = (label: string, fields: Pick<FaceRecord, 'foot' | 'top'>) =>
    editor.edit(label, (d) => setFields(d, [face.id], 'face', fields));
  const setFoot = (next: readonly PlanPoint[]) => {
    if (top === null) {
      set('Reshape wall face', { foot: [...next], top });
      return;
    }
    if (next.length === foot.length) {
      // What stands on a point goes along with it.
      const moved = top.map((p, i) => ({
        x: p.x + next[i]!.x - foot[i]!.x,
        y: p.y + next[i]!.y - foot[i]!.y,
      }));
      set('Reshape wall face', { foot: [...next], top: moved });
      return;
    }
    // Of another number of points, the upper edge is found anew over the foot.
    const world = { doc: () => editor.doc, sheetId: () => face.sheetId, scale: () => editor.scale };
    const kept = next.findIndex((p) => foot.includes(p));
    const above = top[foot.indexOf(next[kept]!)]!;
    const from = [next[kept]!, ...next];
    const edge = upperEdge(world, from, above).top.slice(1);
    set('Reshape wall face', {
      foot: [...next],
      top: next.map((p, i) => top[foot.indexOf(p)] ?? edge[i]!),
    });
  };
  return (
    <>
      <PointsField label="Foot" points={foot} least={2} growing disabled={locked} commit={setFoot} />
      {top !== null && (
        <PointsField
          label="Upper edge"
          points={top}
          least={2}
          growing={false}
          disabled={locked}
          commit={(next) => set('Reshape wall face', { foot, top: [...next] })}
        />
      )}
    </>
  );
}

export function TreeSection({ trees }: { readonly trees: readonly TreeRecord[] }) {
  const editor = useEditor();
  const system = useUnitSystem();
  const ids = idsOf(trees);
  const one = trees.length === 1 ? trees[0]! : null;
  const locked = !editor.canEdit;
  const height = common(trees, (t) => t.heightMeters);
  const base = common(trees, (t) => t.crownBaseMeters);
  const highestBase = Math.max(...trees.map((t) => t.crownBaseMeters));
  const lowestTop = Math.min(...trees.map((t) => t.heightMeters));
  return (
    <>
      <h2>{one === null ? `${trees.length} trees` : one.name || 'Tree'}</h2>
      {one !== null && (
        <CommitField
          label="Name"
          inputId="inspector-name"
          value={one.name}
          maxLength={120}
          placeholder="Tree"
          disabled={locked}
          commit={(name) => {
            editor.edit('Rename tree', (d) => setFields(d, ids, 'tree', { name: name.trim() }));
            return null;
          }}
        />
      )}
      <LengthField
        label="Top"
        value={height ?? null}
        mixed={height === undefined}
        disabled={locked}
        check={(meters) =>
          meters <= highestBase
            ? `Above the lower edge of its crown, ${plainLength(highestBase, system)}.`
            : tooHigh(meters)
        }
        commit={(heightMeters) => {
          if (heightMeters !== null)
            editor.edit('Change height', (d) => setFields(d, ids, 'tree', { heightMeters }));
        }}
      />
      <LengthField
        label="Crown from"
        value={base ?? null}
        mixed={base === undefined}
        disabled={locked}
        hint="0 for a shrub, down to the ground."
        check={(meters) => (meters >= lowestTop ? `Below the top, ${plainLength(lowestTop, system)}.` : null)}
        commit={(crownBaseMeters) => {
          if (crownBaseMeters !== null)
            editor.edit('Change crown', (d) => setFields(d, ids, 'tree', { crownBaseMeters }));
        }}
      />
      {one !== null && <LightThis record={one} />}
      {one !== null && (
        <>
          <PointsField
            label="Foot"
            points={[one.foot]}
            least={1}
            growing={false}
            disabled={locked}
            commit={([foot]) => {
              if (foot !== undefined)
                editor.edit('Reshape tree', (d) => setFields(d, ids, 'tree', { foot: { ...foot } }));
            }}
          />
          <PointsField
            label="Crown"
            points={one.outline}
            least={3}
            growing
            disabled={locked}
            commit={(outline) =>
              editor.edit('Reshape tree', (d) => setFields(d, ids, 'tree', { outline: [...outline] }))
            }
          />
        </>
      )}
    </>
  );
}
