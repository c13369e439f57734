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
  const uprights = useMemo(() => {
    const on = (kind: 'face' | 'tree') =>
      [...recordsOf(doc, kind)].filter((record) => record.sheetId === sheetId).length;
    return { faces: on('face'), trees: on('tree') };
  }, [doc, sheetId]);
  if (counts.size === 0 && uprights.faces + uprights.trees === 0) return null;
  return (
    <ul className={styles.legend} aria-label="What is on this sheet">
      {lookOrder
        .filter((kind) => counts.has(kind))
        .map((kind) => (
          <li key={kind}>
            <FixtureGlyph look={{ kind, tint: 0, notch: null }} size={16} />
            {lookWord(kind)} {counts.get(kind)}
          </li>
        ))}
      {uprights.faces > 0 && (
        <li>
          <FaceGlyph />
          {uprights.faces === 1 ? 'Wall face' : `Wall faces ${uprights.faces}`}
        </li>
      )}
      {uprights.trees > 0 && (
        <li>
          <TreeGlyph />
          {uprights.trees === 1 ? 'Tree' : `Trees ${uprights.trees}`}
        </li>
      )}
    </ul>
  );
}

function FaceGlyph() {
  return (
    <svg width="18" height="16" viewBox="0 0 18 16" aria-hidden="true" focusable="false">
      <path
        d="M1 3h16v10H1zM4.2 3v3M7.4 3v3M10.6 3v3M13.8 3v3"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.2"
      />
    </svg>
  );
}

function TreeGlyph() {
  return (
    <svg width="14" height="16" viewBox="0 0 14 16" aria-hidden="true" focusable="false">
      <path
        d="M7 9v5M2 5.5a5 4.5 0 0 1 10 0 5 4 0 0 1-10 0z"
        fill="none"
        stroke="currentColor"
        strokeWidth="1.2"
      />
      <circle cx="7" cy="14" r="1.6" fill="currentColor" />
    </svg>
  );
}
