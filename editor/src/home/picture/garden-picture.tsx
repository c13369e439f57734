import { type KeyboardEvent, useMemo, useRef, useState } from 'react';
import { type About, aboutInWords, aboutOf } from '../about';
import { changeSentences } from '../changes';
import type { Choice } from '../choice';
import { useEvening } from '../night/use-evening';
import type { Picture, SharedPage } from '../share';
import styles from './garden-picture.module.css';
import { LightCard } from './light-card';
import type { LightChange, ShownMark } from './mark';
import { spotOf } from './sheet-box';
import { type Place, type ShownPin, Stage } from './stage';

interface Props {
  readonly linkId: string;
  readonly page: SharedPage;
  readonly choice: Choice;
  readonly chosenId: string | null;
  readonly onChoose: (recordId: string | null) => void;
  /** A question can be asked. */
  readonly canAsk: boolean;
  readonly pending: About;
  readonly placing: boolean;
  readonly onPlacing: (placing: boolean) => void;
  readonly onAsk: (about: About) => void;
  readonly onQuestion: (questionId: string) => void;
}

interface Tab {
  readonly id: string;
  readonly name: string;
  readonly picture: Picture;
}

/** Their garden, sheet by sheet, with the planned lights. */
export function GardenPicture(props: Props) {
  const { linkId, page, choice, chosenId, pending } = props;
  const { document } = page;
  const tabs = useMemo(() => tabsOf(page), [page]);
  const marks = useMemo(() => marksOf(page, choice), [page, choice]);
  const changed = useMemo(() => changeSentences(page), [page]);
  const [sheetId, setSheetId] = useState(page.pictures[0]?.sheetId);
  const tab = tabs.find(({ id }) => id === sheetId) ?? tabs[0];
  const chosen = marks.find(({ light }) => light.recordId === chosenId);
  const root = useRef<HTMLElement>(null);
  const evening = useEvening(linkId, page, tab?.picture, choice);
  if (!tab) return null;

  const onSheet = (id: string): ShownMark[] =>
    marks
      .filter(({ light }) => light.sheetId === id)
      .map((mark) => ({ ...mark, spot: spotOf(tab.picture, mark.light) }));
  const here = onSheet(tab.id);
  const photo = document.sheets.find(({ id }) => id === tab.id)?.view === 'photo';
  const asked = page.questions.filter(({ recordId }) => recordId !== null && recordId === chosenId);

  const close = (): void => {
    const record = chosenId;
    props.onChoose(null);
    root.current?.querySelector<HTMLElement>(`[data-record="${CSS.escape(record ?? '')}"]`)?.focus();
  };

  return (
    <section
      ref={root}
      className={styles.picture}
      data-tabs={tabs.length > 1 || undefined}
      aria-label="Your garden with its lights"
    >
      {tabs.length > 1 && (
        <Tabs
          tabs={tabs}
          open={tab.id}
          onOpen={(id) => {
            setSheetId(id);
            props.onChoose(null);
            props.onPlacing(false);
          }}
        />
      )}
      <div
        {...(tabs.length > 1 && {
          role: 'tabpanel',
          id: 'sheet-panel',
          'aria-labelledby': `sheet-${tab.id}`,
        })}
      >
        <Stage
          key={tab.id}
          picture={tab.picture}
          evening={evening}
          name={tab.name}
          marks={here}
          pins={pinsOf(page, tab.id)}
          pending={pending.kind === 'place' && pending.sheetId === tab.id ? pending : null}
          chosenId={chosenId}
          onChoose={(id) => props.onChoose(id === chosenId ? null : id)}
          onPin={props.onQuestion}
          placing={props.placing}
          onPlace={(place: Place) => props.onAsk({ kind: 'place', sheetId: tab.id, ...place })}
          onPlacingEnd={() => props.onPlacing(false)}
        >
          {props.canAsk && (
            <button
              type="button"
              className="button"
              aria-pressed={props.placing}
              onClick={() => props.onPlacing(!props.placing)}
            >
              {props.placing ? 'Stop asking' : 'Ask about a place'}
            </button>
          )}
        </Stage>
        <p role="status" className={styles.hint}>
          {props.placing && (
            <>
              Tap the place in the picture
              <span className={styles.byKeys}>, or move the cross with the arrow keys and press Enter</span>.
            </>
          )}
        </p>
        {!props.placing && (
          <>
            <p className={styles.caption}>{captionOf(here, photo, evening.offered)}</p>
            <Legend marks={here} />
          </>
        )}
      </div>
      {chosen && (
        <LightCard
          mark={chosen}
          group={document.price.groups.find(({ id }) => id === chosen.light.groupId)}
          locale={document.locale}
          changed={changed.get(chosen.light.recordId) ?? null}
          questions={asked.length}
          onAsk={props.canAsk ? () => props.onAsk({ kind: 'light', recordId: chosen.light.recordId }) : null}
          onQuestions={() => asked[0] && props.onQuestion(asked[0].id)}
          onClose={close}
        />
      )}
    </section>
  );
}

/** Lights are placed in the sheet's pixels; its picture may be a smaller one of the same shape. */
const tabsOf = ({ document, pictures }: SharedPage): Tab[] =>
  document.sheets.flatMap(({ id, name, widthPx, heightPx }) => {
    const picture = pictures.find(({ sheetId }) => sheetId === id);
    return picture ? [{ id, name, picture: { ...picture, widthPx, heightPx } }] : [];
  });

function marksOf({ document, differences, questions }: SharedPage, choice: Choice): ShownMark[] {
  const changes = new Map<string, LightChange>();
  for (const { recordId } of differences?.moved ?? []) changes.set(recordId, 'moved');
  for (const { recordId } of differences?.replaced ?? []) changes.set(recordId, 'replaced');
  for (const { recordId } of differences?.added ?? []) changes.set(recordId, 'added');
  const asked = new Set(questions.filter(({ resolvedAt }) => resolvedAt === null).map((q) => q.recordId));
  return document.lights.map((light) => ({
    light,
    spot: { x: 0, y: 0 },
    taken: light.groupId === null || choice.has(light.groupId),
    change: changes.get(light.recordId) ?? null,
    asked: asked.has(light.recordId),
  }));
}

const pinsOf = ({ questions, document }: SharedPage, sheetId: string): ShownPin[] =>
  questions.flatMap((question) => {
    const about = aboutOf(question);
    if (about.kind !== 'place' || about.sheetId !== sheetId) return [];
    const text = question.messages[0]?.text ?? '';
    const label = `${aboutInWords(document, about)}: ${text.slice(0, 80)}`;
    return [{ questionId: question.id, label, x: about.x, y: about.y }];
  });

function captionOf(marks: readonly ShownMark[], photo: boolean, evening: boolean): string {
  if (marks.length === 0) return 'No lights are planned in this picture.';
  if (evening) {
    const seen = photo ? '' : ', seen from above';
    return `Artist’s impression from the planned lights and their beams${seen}. Tap a light to see what it is.`;
  }
  const what = photo ? 'Artist’s impression: the' : 'Seen from above. The';
  return `${what} marks show where lights will stand. Tap one to see what it is and what it lights.`;
}

function Legend({ marks }: { readonly marks: readonly ShownMark[] }) {
  const changes = new Set(marks.map(({ change }) => change));
  const entries: string[] = [];
  if (marks.some(({ taken }) => !taken)) entries.push('Dashed: not chosen');
  if (changes.has('added')) entries.push('+ new');
  if (changes.has('moved')) entries.push('→ moved');
  if (changes.has('replaced')) entries.push('⇄ changed');
  return entries.length > 0 ? <p className={styles.legend}>{entries.join(' · ')}</p> : null;
}

function Tabs({
  tabs,
  open,
  onOpen,
}: {
  readonly tabs: readonly Tab[];
  readonly open: string;
  readonly onOpen: (id: string) => void;
}) {
  const list = useRef<HTMLDivElement>(null);
  const keys = (event: KeyboardEvent): void => {
    const by = event.key === 'ArrowRight' ? 1 : event.key === 'ArrowLeft' ? -1 : 0;
    const i = tabs.findIndex(({ id }) => id === open) + by;
    const next = tabs[(i + tabs.length) % tabs.length];
    if (by === 0 || !next) return;
    event.preventDefault();
    onOpen(next.id);
    list.current?.querySelector<HTMLElement>(`#sheet-${CSS.escape(next.id)}`)?.focus();
  };
  return (
    <div ref={list} className={styles.tabs} role="tablist" aria-label="Pictures" onKeyDown={keys}>
      {tabs.map(({ id, name }) => (
        <button
          key={id}
          type="button"
          role="tab"
          id={`sheet-${id}`}
          aria-selected={id === open}
          aria-controls="sheet-panel"
          tabIndex={id === open ? 0 : -1}
          className={styles.tab}
          onClick={() => onOpen(id)}
        >
          {name}
        </button>
      ))}
    </div>
  );
}
