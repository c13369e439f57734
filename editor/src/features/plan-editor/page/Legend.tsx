import { recordsOf } from '@lampwright/geometry/plan';
import { useMemo } from 'react';
import { FixtureGlyph } from '../../../plan-view/FixtureGlyph';
import { fixtureLook, type LookKind, lookOrder, lookWord } from '../../../plan-view/fixture-look';
import { windowOf } from '../../../plan-view/names';
import { useDoc, useEstimate, useSession } from './context';
import styles from './page.module.css';

/** What is on this sheet, counted by mark; only marks that are on it are listed. */
export function Legend() {
  const doc = useDoc();
  const sheetId = useSession((s) => s.sheetId);
  const answers = useEstimate((s) => s.answers);
  const unwired = useEstimate((s) => s.unwired);
  const counts = useMemo(() => {
    const found = new Map<LookKind, number>();
    for (const fixture of recordsOf(doc, 'fixture')) {
      if (fixture.sheetId !== sheetId) continue;
      const kind = unwired.has(fixture.id)
        ? 'unwired'
        : fixtureLook(answers?.fixtures.get(fixture.id), windowOf(doc, fixture)).kind;
      found.set(kind, (found.get(kind) ?? 0) + 1);
    }
    return found;
  }, [doc, sheetId, answers, unwired]);
  if (counts.size === 0) return null;
  return (
    <ul className={styles.legend} aria-label="Fixtures on this sheet">
      {lookOrder
        .filter((kind) => counts.has(kind))
        .map((kind) => (
          <li key={kind}>
            <FixtureGlyph look={{ kind, tint: 0, notch: null }} size={16} />
            {lookWord(kind)} {counts.get(kind)}
          </li>
        ))}
    </ul>
  );
}
