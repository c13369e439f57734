import { drawCable, isNode, type NodeRecord } from '@lampwright/geometry/plan';
import { useMemo, useState } from 'react';
import { Button } from '../../../components/button';
import { tagOf } from '../../../plan-view/names';
import { useDoc, useEditor, useSession } from '../page/context';
import { SelectField } from '../page/controls';
import { type CatalogueEntry, pickItems, pickOf } from '../page/items';
import styles from './inspector.module.css';

/** Draws a straight cable to another mark of the sheet, without a pointer. */
export function WireTo({
  node,
  entries,
}: {
  readonly node: NodeRecord;
  readonly entries: readonly CatalogueEntry[];
}) {
  const editor = useEditor();
  const doc = useDoc();
  const choices = useSession((s) => s.choices);
  const [target, setTarget] = useState('');
  const options = useMemo(() => {
    const found: { value: string; label: string }[] = [];
    for (const record of doc.values())
      if (isNode(record) && record.id !== node.id && record.sheetId === node.sheetId)
        found.push({ value: record.id, label: `${tagOf(doc, record)} ${record.name}`.trim() });
    return found.sort((a, b) => a.label.localeCompare(b.label, undefined, { numeric: true }));
  }, [doc, node]);
  if (options.length === 0) return null;
  const cables = pickItems(doc, entries, 'cable');
  const cable = pickOf(cables, choices.cable);
  return (
    <fieldset className={styles.wire}>
      <legend>Wire to…</legend>
      <SelectField label="Other end" value={target} none="choose" options={options} onChange={setTarget} />
      <SelectField
        label="With"
        value={cable?.key ?? ''}
        options={cables.map((p) => ({ value: p.key, label: p.item.name }))}
        onChange={(key) => {
          const pick = cables.find((p) => p.key === key);
          if (pick !== undefined) editor.session.setState({ choices: { ...choices, cable: pick.choice } });
        }}
      />
      <Button
        disabled={target === '' || cable === undefined}
        onClick={() => {
          if (cable === undefined) return;
          editor.edit('Draw cable', (d, markedToMarked) =>
            drawCable(d, {
              sheetId: node.sheetId,
              stops: [
                { on: 'record', id: node.id },
                { on: 'record', id: target },
              ],
              cable: cable.choice,
              markedToMarked,
            }),
          );
          setTarget('');
        }}
      >
        Wire
      </Button>
    </fieldset>
  );
}
