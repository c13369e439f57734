import {
  type AreaUse,
  areaUses,
  type EditResult,
  newId,
  type PlanDocument,
  placeArea,
  placeNote,
  type SheetRecord,
  setFields,
} from '@lampwright/geometry/plan';
import { parseLength } from '@lampwright/geometry/units';
import { type FormEvent, useState } from 'react';
import { Button } from '../../../components/button';
import type { Request } from '../tools/tool';
import { AskFace, AskTree } from './AskUpright';
import { areaMeaning, areaWord, hasHeight } from './area-words';
import { useEditor, useScale, useSession, useSheet, useUnitSystem } from './context';
import { areaText } from './lengths';
import styles from './page.module.css';
import { useFirstFocus } from './use-first-focus';

/** What a finished gesture still needs from the person, asked over the drawing without locking the page. */
export function Requests() {
  const editor = useEditor();
  const request = useSession((s) => s.request);
  if (request === null) return null;
  const done = () => editor.session.setState({ request: null });
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: Esc leaves what is asked from any of its fields.
    <div
      className={styles.request}
      onKeyDown={(event) => {
        if (event.key !== 'Escape') return;
        event.preventDefault();
        event.stopPropagation();
        done();
      }}
    >
      <Ask key={keyOf(request)} request={request} done={done} />
    </div>
  );
}

function keyOf(request: Request): string {
  return request.kind === 'confirm' ? request.message : JSON.stringify(request);
}

function Ask({ request, done }: { readonly request: Request; readonly done: () => void }) {
  switch (request.kind) {
    case 'confirm':
      return <Confirm message={request.message} proceed={request.proceed} done={done} />;
    case 'area':
      return <AskArea points={request.points} done={done} />;
    case 'face':
      return <AskFace request={request} done={done} />;
    case 'tree':
      return <AskTree request={request} done={done} />;
    case 'note':
      return <AskNote at={request.at} done={done} />;
    case 'scale-length':
      return <AskScaleLength request={request} done={done} />;
    case 'scale-rectangle':
      return <AskRectangle request={request} done={done} />;
  }
}

function Confirm({
  message,
  proceed,
  done,
}: {
  readonly message: string;
  readonly proceed: () => void;
  readonly done: () => void;
}) {
  const first = useFirstFocus<HTMLInputElement>();
  const [sure, setSure] = useState(false);
  return (
    <form
      role="alertdialog"
      aria-label="Marked to marked"
      aria-describedby="confirm-message"
      onSubmit={(event) => {
        event.preventDefault();
        if (!sure) return;
        done();
        proceed();
      }}
    >
      <p id="confirm-message">{message}</p>
      <label className={styles.sure}>
        <input ref={first} type="checkbox" checked={sure} onChange={(e) => setSure(e.target.checked)} />
        The marked conductor meets the marked one, and a meter will show it before the last splice is closed.
      </label>
      <div className={styles.buttons}>
        <Button type="submit" kind="strong" disabled={!sure}>
          Draw it
        </Button>
        <Button onClick={done}>Leave it out</Button>
      </div>
    </form>
  );
}

function AskArea({
  points,
  done,
}: {
  readonly points: readonly { x: number; y: number }[];
  readonly done: () => void;
}) {
  const editor = useEditor();
  const system = useUnitSystem();
  const scale = useScale();
  const sheet = useSheet();
  const first = useFirstFocus<HTMLSelectElement>();
  const [use, setUse] = useState<AreaUse>('bed');
  const [name, setName] = useState('');
  const [height, setHeight] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    let heightMeters: number | null = null;
    if (hasHeight(use) && height.trim() !== '') {
      const parsed = parseLength(height, { preferred: system });
      if (!parsed.ok) {
        setFault(parsed.message);
        return;
      }
      heightMeters = parsed.meters;
    }
    done();
    editor.edit(
      'Draw area',
      (doc) => {
        const placed = placeArea(doc, { sheetId: sheet?.id ?? '', use, points, heightMeters });
        return placed.kind === 'change' && name.trim() !== '' ? withName(placed, name.trim()) : placed;
      },
      false,
    );
  };
  return (
    <form aria-label="New area" onSubmit={submit}>
      <p>
        <strong>Area</strong> {areaText(scale, points, system)}
      </p>
      <label className={styles.row}>
        <span>Is</span>
        <select
          ref={first}
          value={use}
          onChange={(e) => setUse(areaUses.find((u) => u === e.target.value) ?? 'bed')}
        >
          {areaUses.map((u) => (
            <option key={u} value={u}>
              {areaWord(u)}
            </option>
          ))}
        </select>
      </label>
      {areaMeaning(use) !== '' && <p className={styles.small}>{areaMeaning(use)}</p>}
      <label className={styles.row}>
        <span>Name</span>
        <input
          value={name}
          maxLength={120}
          placeholder={areaWord(use)}
          onChange={(e) => setName(e.target.value)}
        />
      </label>
      {hasHeight(use) && (
        <label className={styles.row}>
          <span>Height</span>
          <input
            value={height}
            placeholder={system === 'imperial' ? '9′' : '2.7 m'}
            onChange={(e) => setHeight(e.target.value)}
          />
        </label>
      )}
      {fault !== null && <p role="alert">{fault}</p>}
      <div className={styles.buttons}>
        <Button type="submit" kind="strong">
          Add area
        </Button>
        <Button onClick={done}>Discard</Button>
      </div>
    </form>
  );
}

/** The same change with the new area named, so that drawing and naming are one step. */
function withName(result: EditResult, name: string): EditResult {
  if (result.kind !== 'change') return result;
  const put = Object.fromEntries(
    Object.entries(result.change.put).map(([id, record]) => [
      id,
      record.kind === 'area' ? { ...record, name } : record,
    ]),
  );
  return { ...result, change: { ...result.change, put } };
}

function AskNote({ at, done }: { readonly at: { x: number; y: number }; readonly done: () => void }) {
  const editor = useEditor();
  const first = useFirstFocus<HTMLTextAreaElement>();
  const [text, setText] = useState('');
  const submit = (event: FormEvent) => {
    event.preventDefault();
    done();
    if (text.trim() === '') return;
    const { sheetId } = editor.session.getState();
    editor.edit('Add note', (doc) => placeNote(doc, { sheetId, at, text: text.trim() }), false);
  };
  return (
    <form aria-label="New note" onSubmit={submit}>
      <label className={styles.stack}>
        <strong>Note</strong>
        <textarea
          ref={first}
          rows={3}
          maxLength={4000}
          value={text}
          onChange={(e) => setText(e.target.value)}
        />
      </label>
      <div className={styles.buttons}>
        <Button type="submit" kind="strong">
          Add note
        </Button>
        <Button onClick={done}>Discard</Button>
      </div>
    </form>
  );
}

function addReference(
  doc: PlanDocument,
  sheet: SheetRecord,
  reference: SheetRecord['references'][number],
): EditResult {
  return setFields(doc, [sheet.id], 'sheet', { references: [...sheet.references, reference] });
}

function AskScaleLength({
  request,
  done,
}: {
  readonly request: Extract<Request, { kind: 'scale-length' }>;
  readonly done: () => void;
}) {
  const editor = useEditor();
  const system = useUnitSystem();
  const sheet = useSheet();
  const first = useFirstFocus<HTMLInputElement>();
  const [text, setText] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const parsed = parseLength(text, { preferred: system });
    if (!parsed.ok) {
      setFault(parsed.message);
      return;
    }
    if (parsed.meters === 0) {
      setFault('A length of zero says nothing about the scale.');
      return;
    }
    done();
    if (sheet !== undefined)
      editor.edit('Set scale', (doc) =>
        addReference(doc, sheet, {
          id: newId(),
          kind: 'length',
          a: request.a,
          b: request.b,
          meters: parsed.meters,
        }),
      );
  };
  return (
    <form aria-label="Known length" onSubmit={submit}>
      <label className={styles.row}>
        <span>This is</span>
        <input
          ref={first}
          value={text}
          placeholder={system === 'imperial' ? '19′ 8″' : '6 m'}
          onChange={(e) => setText(e.target.value)}
        />
        <span>long</span>
      </label>
      {fault !== null && <p role="alert">{fault}</p>}
      <div className={styles.buttons}>
        <Button type="submit" kind="strong">
          Use it
        </Button>
        <Button onClick={done}>Discard</Button>
      </div>
    </form>
  );
}

function AskRectangle({
  request,
  done,
}: {
  readonly request: Extract<Request, { kind: 'scale-rectangle' }>;
  readonly done: () => void;
}) {
  const editor = useEditor();
  const system = useUnitSystem();
  const sheet = useSheet();
  const first = useFirstFocus<HTMLInputElement>();
  const [width, setWidth] = useState('');
  const [depth, setDepth] = useState('');
  const [fault, setFault] = useState<string | null>(null);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const w = parseLength(width, { preferred: system });
    const d = parseLength(depth, { preferred: system });
    if (!w.ok || !d.ok) {
      setFault(!w.ok ? w.message : d.ok ? null : d.message);
      return;
    }
    if (w.meters === 0 || d.meters === 0) {
      setFault('A side of zero says nothing about the scale.');
      return;
    }
    const [a, b, c, e] = request.corners;
    done();
    if (sheet !== undefined)
      editor.edit('Set scale', (doc) =>
        addReference(doc, sheet, {
          id: newId(),
          kind: 'rectangle',
          corners: [a, b, c, e],
          widthMeters: w.meters,
          depthMeters: d.meters,
        }),
      );
  };
  return (
    <form aria-label="Known rectangle" onSubmit={submit}>
      <label className={styles.row}>
        <span>First to second corner</span>
        <input
          ref={first}
          value={width}
          placeholder={system === 'imperial' ? '19′ 8″' : '6 m'}
          onChange={(e) => setWidth(e.target.value)}
        />
      </label>
      <label className={styles.row}>
        <span>Second to third corner</span>
        <input
          value={depth}
          placeholder={system === 'imperial' ? '11′ 10″' : '3.6 m'}
          onChange={(e) => setDepth(e.target.value)}
        />
      </label>
      {fault !== null && <p role="alert">{fault}</p>}
      <div className={styles.buttons}>
        <Button type="submit" kind="strong">
          Use it
        </Button>
        <Button onClick={done}>Discard</Button>
      </div>
    </form>
  );
}
