import { type KeyboardEvent, type MouseEvent, useEffect, useMemo, useRef, useState } from 'react';
import { barColour, loadBand } from '../../../plan-view/cable-look';
import { FixtureGlyph } from '../../../plan-view/FixtureGlyph';
import { areaWord } from '../page/area-words';
import { useDoc, useEditor, useEstimate, useSession, useUnitSystem } from '../page/context';
import { plainLength } from '../page/lengths';
import styles from './ledger.module.css';
import { type OutlineRow, outlineOf } from './outline';
import { unfoldedFor, visibleRows } from './visible';

/** The plan as an outline with live figures; all that the drawing can do starts from here by keyboard too. */
export function Ledger() {
  const editor = useEditor();
  const doc = useDoc();
  const system = useUnitSystem();
  const answers = useEstimate((s) => s.answers);
  const unwired = useEstimate((s) => s.unwired);
  const lengths = useEstimate((s) => s.lengths);
  const stale = useEstimate((s) => s.stale);
  const selection = useSession((s) => s.selection);
  const hoveredId = useSession((s) => s.hoveredId);
  const [search, setSearch] = useState('');
  const [activeKey, setActiveKey] = useState<string | null>(null);
  const tree = useRef<HTMLDivElement>(null);

  const rows = useMemo(
    () =>
      outlineOf(doc, { answers, unwired }, lengths, {
        length: (m) => plainLength(m, system),
        area: areaWord,
      }),
    [doc, answers, unwired, lengths, system],
  );
  // What the page began with is unfolded; later choices find their lines by the search or by unfolding.
  const [toggled, setToggled] = useState<ReadonlySet<string>>(() => unfoldedFor(rows, selection));
  const shown = useMemo(() => visibleRows(rows, toggled, search), [rows, toggled, search]);
  const active = shown.find((s) => s.row.key === activeKey)?.row.key ?? shown[0]?.row.key ?? null;

  // What is chosen on the drawing becomes the line that Tab lands on, and is brought into sight.
  const chosen = selection.size === 1 ? [...selection][0] : undefined;
  useEffect(() => {
    if (chosen === undefined) return;
    setActiveKey(chosen);
    const line = tree.current?.querySelector(`[data-key="${CSS.escape(chosen)}"]`);
    line?.scrollIntoView({ block: 'nearest' });
  }, [chosen]);

  // biome-ignore lint/correctness/useExhaustiveDependencies: only what the page began with is brought into sight.
  useEffect(() => {
    const first = shown.find(({ row }) => row.recordId !== null && selection.has(row.recordId));
    if (first === undefined) return;
    setActiveKey(first.row.key);
    tree.current
      ?.querySelector(`[data-key="${CSS.escape(first.row.key)}"]`)
      ?.scrollIntoView({ block: 'nearest' });
  }, []);

  const focus = (key: string | undefined) => {
    if (key === undefined) return;
    setActiveKey(key);
    tree.current?.querySelector<HTMLElement>(`[data-key="${CSS.escape(key)}"]`)?.focus();
  };
  const toggle = (key: string) => {
    const next = new Set(toggled);
    if (!next.delete(key)) next.add(key);
    setToggled(next);
  };
  const choose = (row: OutlineRow, add: boolean) => {
    if (row.recordId !== null) editor.reveal(row.recordId, add);
    else if (row.parentOf > 0) toggle(row.key);
  };

  const onKeyDown = (event: KeyboardEvent, row: OutlineRow, open: boolean) => {
    if (event.altKey || event.ctrlKey || event.metaKey) return;
    const at = shown.findIndex((s) => s.row.key === row.key);
    switch (event.key) {
      case 'ArrowDown':
        focus(shown[at + 1]?.row.key);
        break;
      case 'ArrowUp':
        focus(shown[at - 1]?.row.key);
        break;
      case 'Home':
        focus(shown[0]?.row.key);
        break;
      case 'End':
        focus(shown.at(-1)?.row.key);
        break;
      case 'ArrowRight':
        if (row.parentOf === 0) break;
        if (open) focus(shown[at + 1]?.row.key);
        else toggle(row.key);
        break;
      case 'ArrowLeft':
        if (row.parentOf > 0 && open) toggle(row.key);
        else focus(row.parent ?? undefined);
        break;
      case 'Enter':
      case ' ':
        choose(row, event.shiftKey);
        break;
      case 'F2':
        choose(row, false);
        requestAnimationFrame(() => document.getElementById('inspector-name')?.focus());
        break;
      case 'Delete':
      case 'Backspace': {
        if (row.recordId === null) return;
        if (!selection.has(row.recordId)) editor.select([row.recordId]);
        const next = shown[at + 1]?.row.key ?? shown[at - 1]?.row.key;
        editor.deleteSelection();
        requestAnimationFrame(() => focus(next));
        break;
      }
      default:
        return;
    }
    event.preventDefault();
    event.stopPropagation();
  };

  return (
    <section className={styles.ledger} aria-labelledby="ledger-title">
      <header className={styles.head}>
        <h2 id="ledger-title">Ledger</h2>
        <input
          type="search"
          className={styles.find}
          aria-label="Find in the ledger"
          placeholder="Find…"
          value={search}
          onChange={(event) => setSearch(event.target.value)}
        />
      </header>
      {rows.length === 0 ? (
        <p className={styles.empty}>
          Nothing is on the plan yet.{' '}
          {editor.canEdit && 'Place the transformer first, then fixtures, then draw the cable.'}
        </p>
      ) : (
        <div
          ref={tree}
          role="tree"
          aria-label="What is on the plan"
          aria-multiselectable="true"
          className={styles.tree}
          data-stale={stale || undefined}
        >
          {shown.map(({ row, open }) => (
            <Line
              key={row.key}
              row={row}
              open={open}
              focusable={row.key === active}
              chosen={row.recordId !== null && selection.has(row.recordId)}
              hovered={row.recordId !== null && row.recordId === hoveredId}
              onKeyDown={(event) => onKeyDown(event, row, open)}
              onClick={(event) => choose(row, event.shiftKey || event.ctrlKey || event.metaKey)}
              onToggle={() => toggle(row.key)}
              onHover={(over) => editor.hover(over ? row.recordId : null)}
              onFocus={() => setActiveKey(row.key)}
            />
          ))}
          {shown.length === 0 && <p className={styles.empty}>Nothing matches “{search}”.</p>}
        </div>
      )}
    </section>
  );
}

interface LineProps {
  readonly row: OutlineRow;
  readonly open: boolean;
  readonly focusable: boolean;
  readonly chosen: boolean;
  readonly hovered: boolean;
  readonly onKeyDown: (event: KeyboardEvent) => void;
  readonly onClick: (event: MouseEvent) => void;
  readonly onToggle: () => void;
  readonly onHover: (over: boolean) => void;
  readonly onFocus: () => void;
}

function Line({
  row,
  open,
  focusable,
  chosen,
  hovered,
  onKeyDown,
  onClick,
  onToggle,
  onHover,
  onFocus,
}: LineProps) {
  return (
    <div
      role="treeitem"
      data-key={row.key}
      data-kind={row.kind}
      data-hovered={hovered || undefined}
      aria-level={row.level}
      aria-selected={chosen}
      aria-expanded={row.parentOf > 0 ? open : undefined}
      tabIndex={focusable ? 0 : -1}
      className={styles.line}
      style={{ paddingInlineStart: `${(row.level - 1) * 14 + 12}px` }}
      onKeyDown={onKeyDown}
      onClick={onClick}
      onFocus={onFocus}
      onPointerEnter={() => onHover(true)}
      onPointerLeave={() => onHover(false)}
    >
      {row.parentOf > 0 && (
        <span
          className={styles.fold}
          data-open={open || undefined}
          aria-hidden="true"
          onClick={(event) => {
            event.stopPropagation();
            onToggle();
          }}
        >
          ›
        </span>
      )}
      {row.look !== null && <FixtureGlyph look={row.look} size={16} />}
      <span className={styles.title}>
        {row.title}
        {row.detail !== '' && <span className={styles.detail}> {row.detail}</span>}
      </span>
      <span className={styles.figure}>{row.figure}</span>
      {row.kind === 'transformer' && row.loadPercent !== null && <LoadBar percent={row.loadPercent} />}
    </div>
  );
}

/** A load against its limit; the tick stands at 80 %, up to where a transformer should be loaded. */
function LoadBar({ percent }: { readonly percent: number }) {
  return (
    <span className={styles.bar} role="img" aria-label={`loaded to ${Math.round(percent)} percent`}>
      <span
        className={styles.load}
        style={{ inlineSize: `${Math.min(100, percent)}%`, background: barColour(loadBand(percent)) }}
      />
      <span className={styles.tick} />
    </span>
  );
}
