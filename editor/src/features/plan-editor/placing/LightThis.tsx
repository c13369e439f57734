import { Button } from '../../../components/button';
import { useEditor } from '../page/context';
import { bringIntoView } from './bring-into-view';
import { kindOf, type Lightable } from './subject';

/** Opens the proposal of lights for what is chosen. */
export function LightThis({ record }: { readonly record: Lightable }) {
  const editor = useEditor();
  if (!editor.canEdit) return null;
  return (
    <div>
      <Button
        onClick={() => {
          editor.use('select');
          const placingSide = bringIntoView(editor, record);
          editor.session.setState({ placingId: record.id, placingSide, panel: 'placing', drawer: 'none' });
        }}
      >
        Light this {kindOf(record)}…
      </Button>
    </div>
  );
}
