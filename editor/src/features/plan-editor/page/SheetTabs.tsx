import { recordsOf } from '@lampwright/geometry/plan';
import { useMemo } from 'react';
import { Link } from 'react-router-dom';
import { useDoc, useEditor, useSession } from './context';
import styles from './page.module.css';

export function SheetTabs({ addSheetTo }: { readonly addSheetTo: string | null }) {
  const editor = useEditor();
  const doc = useDoc();
  const sheetId = useSession((s) => s.sheetId);
  const sheets = useMemo(() => [...recordsOf(doc, 'sheet')].sort((a, b) => a.order - b.order), [doc]);
  return (
    <nav className={styles.tabs} aria-label="Sheets">
      {sheets.map((sheet) => (
        <button
          key={sheet.id}
          type="button"
          aria-current={sheet.id === sheetId ? 'page' : undefined}
          onClick={() => editor.openSheet(sheet.id)}
        >
          {sheet.name || 'Sheet'}
        </button>
      ))}
      {addSheetTo !== null && (
        <Link to={addSheetTo} className={styles.addSheet}>
          + Sheet
        </Link>
      )}
    </nav>
  );
}
