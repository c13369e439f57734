import { Link } from 'react-router-dom';
import { Button } from '../../../components/button';
import { Mark } from '../../../components/mark';
import { count } from '../../../lib/format';
import { useEditor, usePlan } from './context';
import styles from './page.module.css';
import { SaveNote } from './SaveNote';
import { SheetTabs } from './SheetTabs';
import type { Faults } from './use-faults';

interface TopBarProps {
  readonly jobName: string;
  readonly jobTo: string;
  readonly jobsTo: string;
  readonly faults: Faults;
  /** Null where nothing was asked. */
  readonly openQuestions: number | null;
}

/** What stands in the way of moving the job on. */
export function faultsWord(faults: Faults): string {
  const { fault, caution, advice } = faults.counts;
  if (fault > 0) return `${fault} ${fault === 1 ? 'fault' : 'faults'} before sharing`;
  if (!faults.voltsKnown) return 'Volts not known yet';
  return caution + advice > 0 ? `No faults, ${caution + advice} to look at` : 'No faults';
}

/** The same for where there is little room. */
export function faultsShort({ counts: { fault }, voltsKnown }: Faults): string {
  if (fault > 0) return `${fault} ${fault === 1 ? 'fault' : 'faults'}`;
  return voltsKnown ? 'No faults' : 'No volts yet';
}

export function TopBar({ jobName, jobTo, jobsTo, faults, openQuestions }: TopBarProps) {
  const editor = useEditor();
  const undoLabel = usePlan((s) => s.undoLabel);
  const redoLabel = usePlan((s) => s.redoLabel);
  const open = (panel: 'faults' | 'history' | 'questions') =>
    editor.session.setState({ panel: editor.session.getState().panel === panel ? 'none' : panel });
  return (
    <header className={styles.bar}>
      <Link to={jobsTo} className={styles.home} aria-label="Lampwright, all jobs">
        <Mark />
        <span>Lampwright</span>
      </Link>
      <Link to={jobTo} className={styles.job}>
        {jobName}
      </Link>
      <SheetTabs addSheetTo={editor.canEdit ? jobTo : null} />
      <div className={styles.spring} />
      {editor.canEdit ? (
        <SaveNote />
      ) : (
        <span className={styles.saved} title="Owners and designers change plans">
          View only
        </span>
      )}
      {editor.canEdit && (
        <span className={styles.later}>
          <Button
            disabled={undoLabel === null}
            title={undoLabel === null ? 'Nothing to undo' : `Undo: ${undoLabel}`}
            onClick={() => editor.undo()}
          >
            Undo
          </Button>
          <Button
            disabled={redoLabel === null}
            title={redoLabel === null ? 'Nothing to redo' : `Redo: ${redoLabel}`}
            onClick={() => editor.redo()}
          >
            Redo
          </Button>
        </span>
      )}
      {openQuestions !== null && (
        <Button onClick={() => open('questions')}>
          {openQuestions === 0 ? 'Questions' : count(openQuestions, 'question')}
        </Button>
      )}
      <Button onClick={() => open('history')}>History</Button>
      <span className={styles.break} />
      <span className={styles.faultsButton}>
        <Button kind="strong" onClick={() => open('faults')}>
          {faultsWord(faults)}
        </Button>
      </span>
    </header>
  );
}
