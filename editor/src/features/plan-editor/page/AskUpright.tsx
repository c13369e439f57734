import { placeFace, placeTree } from '@lampwright/geometry/plan';
import { formatLength, meters, parseLength, type UnitSystem } from '@lampwright/geometry/units';
import { type FormEvent, useId, useState } from 'react';
import { Button } from '../../../components/button';
import type { Request } from '../tools/tool';
import { useEditor, useScale, useSheet, useUnitSystem } from './context';
import { lengthText } from './lengths';
import styles from './page.module.css';
import { useFirstFocus } from './use-first-focus';

/** Nothing that is marked on a plan is higher. */
const HIGHEST_METERS = 100;

interface AskProps<K extends Request['kind']> {
  readonly request: Extract<Request, { kind: K }>;
  readonly done: () => void;
}

const written = (length: number | null, system: UnitSystem): string =>
  length === null ? '' : formatLength(meters(length), { system });

type Read = { readonly meters: number } | { readonly fault: string };

/** A height as typed; zero only where it means something. */
function readHeight(text: string, preferred: UnitSystem, zero: boolean): Read {
  const parsed = parseLength(text, { preferred });
  if (!parsed.ok) return { fault: parsed.message };
  if (parsed.meters > HIGHEST_METERS) return { fault: `A height of at most ${HIGHEST_METERS} m.` };
  if (parsed.meters === 0 && !zero) return { fault: 'A height of zero stops no light.' };
  return { meters: parsed.meters };
}

/** The height of a wall face that was just drawn, with what the photo's camera tells of it. */
export function AskFace({ request, done }: AskProps<'face'>) {
  const editor = useEditor();
  const system = useUnitSystem();
  const scale = useScale();
  const sheet = useSheet();
  const first = useFirstFocus<HTMLInputElement>();
  const [name, setName] = useState('');
  const [height, setHeight] = useState(() => written(request.seenMeters, system));
  const [fault, setFault] = useState<string | null>(null);
  const faultId = useId();
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const read = readHeight(height, system, false);
    if ('fault' in read) {
      setFault(read.fault);
      return;
    }
    done();
    const { foot, top } = request;
    editor.edit(
      'Mark wall face',
      (doc) =>
        placeFace(doc, {
          sheetId: sheet?.id ?? '',
          name: name.trim(),
          foot: [...foot],
          top: top === null ? null : [...top],
          heightMeters: read.meters,
        }),
      false,
    );
  };
  return (
    <form aria-label="New wall face" onSubmit={submit}>
      <p>
        <strong>Wall face</strong> {lengthText(scale, request.foot, system)}
      </p>
      <label className={styles.row}>
        <span>Height</span>
        <input
          ref={first}
          value={height}
          placeholder={system === 'imperial' ? '9′' : '2.70 m'}
          aria-invalid={fault !== null || undefined}
          aria-describedby={fault === null ? undefined : faultId}
          onChange={(e) => setHeight(e.target.value)}
        />
      </label>
      {request.seenMeters !== null && (
        <p className={styles.small}>
          As this photo’s scale tells it: {written(request.seenMeters, system)}. Measure where it matters.
        </p>
      )}
      <label className={styles.row}>
        <span>Name</span>
        <input
          value={name}
          maxLength={120}
          placeholder="Wall face"
          onChange={(e) => setName(e.target.value)}
        />
      </label>
      {fault !== null && (
        <p id={faultId} role="alert">
          {fault}
        </p>
      )}
      <div className={styles.buttons}>
        <Button type="submit" kind="strong">
          Add wall face
        </Button>
        <Button onClick={done}>Discard</Button>
      </div>
    </form>
  );
}

/** The heights of a tree or shrub that was just drawn. */
export function AskTree({ request, done }: AskProps<'tree'>) {
  const editor = useEditor();
  const system = useUnitSystem();
  const sheet = useSheet();
  const first = useFirstFocus<HTMLInputElement>();
  const { seen } = request;
  const [name, setName] = useState('');
  const [height, setHeight] = useState(() => written(seen?.heightMeters ?? null, system));
  const [base, setBase] = useState(() => written(seen?.crownBaseMeters ?? null, system));
  const [fault, setFault] = useState<string | null>(null);
  const faultId = useId();
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const top = readHeight(height, system, false);
    const lower = base.trim() === '' ? { meters: 0 } : readHeight(base, system, true);
    if ('fault' in top || 'fault' in lower) {
      setFault('fault' in top ? top.fault : 'fault' in lower ? lower.fault : null);
      return;
    }
    if (lower.meters >= top.meters) {
      setFault('The crown must begin below the top of the tree.');
      return;
    }
    done();
    editor.edit(
      'Mark tree',
      (doc) =>
        placeTree(doc, {
          sheetId: sheet?.id ?? '',
          name: name.trim(),
          foot: request.foot,
          outline: [...request.outline],
          heightMeters: top.meters,
          crownBaseMeters: lower.meters,
        }),
      false,
    );
  };
  return (
    <form aria-label="New tree or shrub" onSubmit={submit}>
      <p>
        <strong>Tree or shrub</strong>
      </p>
      <label className={styles.row}>
        <span>Top</span>
        <input
          ref={first}
          value={height}
          placeholder={system === 'imperial' ? '20′' : '6.00 m'}
          aria-invalid={fault !== null || undefined}
          aria-describedby={fault === null ? undefined : faultId}
          onChange={(e) => setHeight(e.target.value)}
        />
      </label>
      <label className={styles.row}>
        <span>Crown from</span>
        <input value={base} placeholder="0: a shrub" onChange={(e) => setBase(e.target.value)} />
      </label>
      {seen !== null && (
        <p className={styles.small}>As this photo’s scale tells it. 0 is for a shrub, down to the ground.</p>
      )}
      <label className={styles.row}>
        <span>Name</span>
        <input value={name} maxLength={120} placeholder="Tree" onChange={(e) => setName(e.target.value)} />
      </label>
      {fault !== null && (
        <p id={faultId} role="alert">
          {fault}
        </p>
      )}
      <div className={styles.buttons}>
        <Button type="submit" kind="strong">
          Add tree
        </Button>
        <Button onClick={done}>Discard</Button>
      </div>
    </form>
  );
}
