import type { PlanRecord } from '@lampwright/geometry/plan';
import { isNode } from '@lampwright/geometry/plan';
import { useMemo } from 'react';
import { Button } from '../../../components/button';
import { useDoc, useEditor, useSession } from '../page/context';
import type { CatalogueEntry } from '../page/items';
import { AreaSection } from './AreaSection';
import { CableSection } from './CableSection';
import { FixtureSection } from './FixtureSection';
import styles from './inspector.module.css';
import { JunctionSection, MeasurementSection, NoteSection } from './OtherSections';
import { RunSection } from './RunSection';
import { TimesSection, ZoneSection } from './SwitchSections';
import { ofKind } from './shared';
import { TransformerSection } from './TransformerSection';
import { FaceSection, TreeSection } from './UprightSections';
import { WireTo } from './WireTo';

/** What is chosen, in figures and fields; several of a kind are changed together. */
export function Inspector({ entries }: { readonly entries: readonly CatalogueEntry[] }) {
  const editor = useEditor();
  const doc = useDoc();
  const selection = useSession((s) => s.selection);
  const records = useMemo(
    () => [...selection].map((id) => doc.get(id)).filter((r): r is PlanRecord => r !== undefined),
    [doc, selection],
  );
  if (records.length === 0) return null;
  const fixtures = ofKind(records, 'fixture');
  const cables = ofKind(records, 'cable');
  const transformers = ofKind(records, 'transformer');
  const runs = ofKind(records, 'run');
  const junctions = ofKind(records, 'junction');
  const areas = ofKind(records, 'area');
  const faces = ofKind(records, 'face');
  const trees = ofKind(records, 'tree');
  const zones = ofKind(records, 'zone');
  const notes = ofKind(records, 'note');
  const measurements = ofKind(records, 'measurement');
  const [only] = records;
  return (
    <section className={styles.inspector} aria-label="What is chosen">
      {records.length > 1 && <h2>{records.length} chosen</h2>}
      {fixtures.length > 0 && <FixtureSection fixtures={fixtures} entries={entries} />}
      {cables.length > 0 && <CableSection cables={cables} entries={entries} />}
      {transformers.length > 0 && <TransformerSection transformers={transformers} entries={entries} />}
      {runs.length > 0 && <RunSection runs={runs} />}
      {junctions.length > 0 && <JunctionSection junctions={junctions} />}
      {areas.length > 0 && <AreaSection areas={areas} />}
      {faces.length > 0 && <FaceSection faces={faces} />}
      {trees.length > 0 && <TreeSection trees={trees} />}
      {zones.length === 1 && <ZoneSection key={zones[0]!.id} zone={zones[0]!} />}
      {records.some((r) => r.kind === 'settings') && <TimesSection />}
      {measurements.length === 1 && <MeasurementSection measurement={measurements[0]!} />}
      {notes.length === 1 && <NoteSection note={notes[0]!} />}
      {editor.canEdit && !records.every((r) => r.kind === 'settings') && (
        <>
          {records.length === 1 && isNode(only) && <WireTo key={only.id} node={only} entries={entries} />}
          <div className={styles.actions}>
            {runs.length + zones.length < records.length && (
              <Button onClick={() => editor.duplicateSelection()}>Duplicate</Button>
            )}
            <Button onClick={() => editor.deleteSelection()}>Delete</Button>
          </div>
        </>
      )}
    </section>
  );
}
