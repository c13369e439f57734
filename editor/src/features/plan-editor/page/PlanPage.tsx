import { type ReactNode, useEffect } from 'react';
import { Link } from 'react-router-dom';
import { PlanCanvas } from '../canvas/PlanCanvas';
import { Inspector } from '../inspector/Inspector';
import { Ledger } from '../ledger/Ledger';
import { NightProvider } from '../night/context';
import { DayNight } from '../night/DayNight';
import { EveningBar } from '../night/EveningBar';
import type { NightHere } from '../night/here';
import { NightSide } from '../night/NightSide';
import nightStyles from '../night/night-page.module.css';
import { PlacingPanel } from '../placing/PlacingPanel';
import { Profile } from '../profile/Profile';
import { ScalePanel } from '../scale/ScalePanel';
import type { Drawer } from '../store/session';
import { Conflicts } from './Conflicts';
import { useDoc, useEditor, useEstimate, usePlan, useScale, useSession, useSheet, useTools } from './context';
import { FaultList } from './FaultList';
import { type CatalogueEntry, firstChoices } from './items';
import { Legend } from './Legend';
import { type Pin, Pins } from './Pins';
import styles from './page.module.css';
import { Requests } from './Requests';
import { pageKey } from './shortcuts';
import { ToolOptions } from './ToolOptions';
import { ToolStrip } from './ToolStrip';
import { faultsShort, TopBar } from './TopBar';
import { type Faults, useFaults } from './use-faults';
import { ZoomBar } from './ZoomBar';

export interface PlanPageProps {
  readonly jobName: string;
  readonly jobTo: string;
  readonly jobsTo: string;
  /** Where the picture of a sheet is; null while it has none. */
  readonly imageUrl: (sheetId: string) => string | null;
  readonly entries: readonly CatalogueEntry[];
  /** The list of earlier versions. */
  readonly history: ReactNode;
  /** What the client asked about the plan; null where nothing was. */
  readonly questions: AskedQuestions | null;
  /** Where and how the evening of this job is. */
  readonly here: NightHere;
}

export interface AskedQuestions {
  /** How many are open. */
  readonly open: number;
  /** Where the open ones are. */
  readonly pins: readonly Pin[];
  readonly onPin: (id: string) => void;
  /** All of them, to read and answer. */
  readonly panel: ReactNode;
}

/** The plan page: the drawing fills the window; tools, ledger and profile stand around it. */
export function PlanPage({ here, ...page }: PlanPageProps) {
  return (
    <NightProvider here={here}>
      <Page {...page} />
    </NightProvider>
  );
}

function Page({
  jobName,
  jobTo,
  jobsTo,
  imageUrl,
  entries,
  history,
  questions,
}: Omit<PlanPageProps, 'here'>) {
  const editor = useEditor();
  const doc = useDoc();
  const sheet = useSheet();
  const faults = useFaults();
  const drawer = useSession((s) => s.drawer);
  const night = useSession((s) => s.mode === 'night');
  const asking = useSession((s) => s.request !== null);

  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (!event.defaultPrevented && pageKey(editor, event)) event.preventDefault();
    };
    window.addEventListener('keydown', onKeyDown);
    return () => window.removeEventListener('keydown', onKeyDown);
  }, [editor]);

  // biome-ignore lint/correctness/useExhaustiveDependencies: the first choices are made once the catalogue is there.
  useEffect(() => {
    const { choices } = editor.session.getState();
    editor.entries = entries;
    editor.session.setState({ choices: firstChoices(doc, entries, choices) });
  }, [editor, entries]);

  return (
    <div className={`${styles.page} ${nightStyles.page}`} data-night={night || undefined}>
      <TopBar
        jobName={jobName}
        jobTo={jobTo}
        jobsTo={jobsTo}
        faults={faults}
        openQuestions={questions?.open ?? null}
      />
      <ToolStrip />
      <main className={styles.drawing}>
        <h1 className="visually-hidden">Plan of {jobName}</h1>
        {sheet === undefined ? <NoSheet jobTo={jobTo} /> : <PlanCanvas imageUrl={imageUrl(sheet.id)} />}
        {sheet !== undefined && questions !== null && <Pins pins={questions.pins} onPin={questions.onPin} />}
        <ToolOptions entries={entries} />
        <Requests />
        {!asking && <Messages />}
        {sheet !== undefined && (
          <div className={styles.foot}>
            {!night && <Legend />}
            <span className={styles.spring} />
            <DayNight />
            <ZoomBar />
          </div>
        )}
        <Panels entries={entries} faults={faults} history={history} questions={questions?.panel ?? null} />
      </main>
      {night ? (
        <EveningBar />
      ) : (
        <aside className={styles.profile} data-open={drawer === 'profile' || undefined} aria-label="Profile">
          <Profile />
        </aside>
      )}
      <aside
        className={styles.side}
        data-open={drawer === 'ledger' || drawer === 'light' || drawer === 'inspector' || undefined}
        data-part={drawer === 'light' ? 'ledger' : drawer}
        aria-label={night ? 'Light and ledger' : 'Ledger'}
      >
        {night ? <NightSide jobName={jobName} /> : <Ledger />}
        <Inspector entries={entries} />
      </aside>
      <Drawers faults={faults} />
    </div>
  );
}

interface PanelsProps {
  readonly entries: readonly CatalogueEntry[];
  readonly faults: Faults;
  readonly history: ReactNode;
  readonly questions: ReactNode;
}

function Panels({ entries, faults, history, questions }: PanelsProps) {
  const panel = useSession((s) => s.panel);
  switch (panel) {
    case 'none':
      return null;
    case 'scale':
      return <ScalePanel />;
    case 'faults':
      return <FaultList faults={faults} />;
    case 'history':
      return history;
    case 'questions':
      return questions;
    case 'conflicts':
      return <Conflicts />;
    case 'placing':
      return <PlacingPanel entries={entries} />;
  }
}

function NoSheet({ jobTo }: { readonly jobTo: string }) {
  return (
    <div className={styles.nothing}>
      <h2>No sheet yet</h2>
      <p>A plan is drawn over a photo of the yard or a plot plan.</p>
      <Link className={styles.primary} to={jobTo}>
        Add a photo or a plot plan
      </Link>
    </div>
  );
}

/** What the page has to say while one draws: refusals, the missing scale, volts that did not come. */
function Messages() {
  const editor = useEditor();
  const message = useSession((s) => s.message);
  const problem = useEstimate((s) => s.problem);
  const scale = useScale();
  const sheet = useSheet();
  const hasCable = useEstimate((s) => (s.plan?.waiting.length ?? 0) > 0);
  const toolId = useTools((s) => s.toolId);
  const conflicts = usePlan((s) => s.conflicts.length);
  const panel = useSession((s) => s.panel);
  return (
    <div className={styles.messages} aria-live="polite">
      {message !== null && (
        <p>
          {message}
          <button type="button" onClick={() => editor.session.setState({ message: null })}>
            Close
          </button>
        </p>
      )}
      {conflicts > 0 && panel !== 'conflicts' && (
        <p>
          Somebody else changed what you changed.
          <button type="button" onClick={() => editor.session.setState({ panel: 'conflicts' })}>
            Choose
          </button>
        </p>
      )}
      {problem !== null && (
        <p>
          No volts: {problem}
          <button type="button" onClick={() => editor.estimate.retry()}>
            Try again
          </button>
        </p>
      )}
      {sheet !== undefined && scale === null && hasCable && toolId !== 'scale' && (
        <p>
          Lengths and volts wait for this sheet’s scale.
          {editor.canEdit && (
            <button type="button" onClick={() => editor.use('scale')}>
              Set the scale
            </button>
          )}
        </p>
      )}
    </div>
  );
}

const words: Readonly<Record<Exclude<Drawer, 'none'>, string>> = {
  ledger: 'Ledger',
  light: 'Light',
  profile: 'Profile',
  inspector: 'Chosen',
};
const dayDrawers = ['ledger', 'profile', 'inspector'] as const;
const nightDrawers = ['light', 'ledger', 'inspector'] as const;

/** On a phone: what slides up over the drawing. */
function Drawers({ faults }: { readonly faults: Faults }) {
  const editor = useEditor();
  const drawer = useSession((s) => s.drawer);
  const chosen = useSession((s) => s.selection.size);
  const night = useSession((s) => s.mode === 'night');
  const toggle = (id: Drawer) =>
    editor.session.setState({
      drawer: drawer === id ? 'none' : id,
      ...((id === 'ledger' || id === 'light') && { side: id }),
    });
  return (
    <section className={styles.drawers} aria-label="Panels">
      {(night ? nightDrawers : dayDrawers).map((id) => (
        <button
          key={id}
          type="button"
          aria-pressed={drawer === id}
          disabled={id === 'inspector' && chosen === 0}
          onClick={() => toggle(id)}
        >
          {id === 'inspector' && chosen > 0 ? `${words[id]} ${chosen}` : words[id]}
        </button>
      ))}
      <button
        type="button"
        className={styles.strong}
        onClick={() => editor.session.setState({ panel: 'faults', drawer: 'none' })}
      >
        {faultsShort(faults)}
      </button>
    </section>
  );
}
