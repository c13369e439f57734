import { type ToolId, toolIds } from '../tools/tool';
import { useEditor, useTools } from './context';
import { ToolIcon, toolKeys, toolWord } from './icons';
import styles from './page.module.css';

const keyOf = (id: ToolId): string =>
  Object.entries(toolKeys)
    .find(([, tool]) => tool === id)![0]
    .toUpperCase();

export function ToolStrip() {
  const editor = useEditor();
  const toolId = useTools((s) => s.toolId);
  const tools = editor.canEdit ? toolIds : (['select'] as const);
  return (
    <section className={styles.strip} aria-label="Tools">
      {tools.map((id) => (
        <button
          key={id}
          type="button"
          className={styles.tool}
          aria-pressed={toolId === id}
          aria-keyshortcuts={keyOf(id)}
          title={`${toolWord(id)} (${keyOf(id)})`}
          onClick={() => editor.use(id)}
        >
          <ToolIcon id={id} />
          <span>{toolWord(id)}</span>
        </button>
      ))}
    </section>
  );
}
