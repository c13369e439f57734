import { type KeyboardEvent, useEffect, useRef } from 'react';
import { type ToolId, toolIds } from '../tools/tool';
import { useEditor, useSheet, useTools } from './context';
import { ToolIcon, toolKeys, toolWord } from './icons';
import styles from './page.module.css';

const keyOf = (id: ToolId): string =>
  Object.entries(toolKeys)
    .find(([, tool]) => tool === id)![0]
    .toUpperCase();

/** How far an arrow key moves along the strip, whichever way it lies. */
const steps: Readonly<Record<string, number>> = { ArrowDown: 1, ArrowRight: 1, ArrowUp: -1, ArrowLeft: -1 };

export function ToolStrip() {
  const editor = useEditor();
  const toolId = useTools((s) => s.toolId);
  const bar = useRef<HTMLDivElement>(null);
  const sheet = useSheet();
  // Without a sheet there is nothing to draw on.
  const tools: readonly ToolId[] = editor.canEdit && sheet !== undefined ? toolIds : ['select'];
  // On a phone the strip is wider than the window.
  // biome-ignore lint/correctness/useExhaustiveDependencies: another tool is at work.
  useEffect(() => {
    bar.current
      ?.querySelector('[aria-pressed="true"]')
      ?.scrollIntoView({ block: 'nearest', inline: 'nearest' });
  }, [toolId]);
  // One tab stop, its tool at work; arrows go on from there.
  const onKeyDown = (event: KeyboardEvent) => {
    const step = steps[event.key];
    const buttons = [...(bar.current?.querySelectorAll('button') ?? [])];
    const at = buttons.findIndex((button) => button.contains(document.activeElement));
    if (step === undefined || at < 0) return;
    event.preventDefault();
    buttons[(at + step + buttons.length) % buttons.length]?.focus();
  };
  return (
    <section className={styles.strip} aria-label="Tool strip">
      <div ref={bar} className={styles.tools} role="toolbar" aria-label="Tools" onKeyDown={onKeyDown}>
        {tools.map((id) => (
          <button
            key={id}
            type="button"
            className={styles.tool}
            aria-pressed={toolId === id}
            aria-keyshortcuts={keyOf(id)}
            tabIndex={toolId === id ? 0 : -1}
            title={`${toolWord(id)} (${keyOf(id)})`}
            onClick={() => editor.use(id)}
          >
            <ToolIcon id={id} />
            <span>{toolWord(id)}</span>
          </button>
        ))}
      </div>
    </section>
  );
}
