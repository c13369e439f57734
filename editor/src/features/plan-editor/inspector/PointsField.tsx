import type { PlanPoint } from '@lampwright/geometry/plan';
import { useId, useState } from 'react';
import { Button } from '../../../components/button';
import styles from './points.module.css';

/** Beyond this many points an outline was drawn by hand, and nobody types it. */
const MOST_TYPED = 60;

interface PointsFieldProps {
  readonly label: string;
  readonly points: readonly PlanPoint[];
  readonly least: number;
  readonly disabled: boolean;
  /** Whether points can be added and taken out here. */
  readonly growing: boolean;
  readonly commit: (points: readonly PlanPoint[]) => void;
}

/** Points of a shape in sheet pixels, to be moved, added and taken out without a pointer. */
export function PointsField({ label, points, least, disabled, growing, commit }: PointsFieldProps) {
  const id = useId();
  if (points.length > MOST_TYPED)
    return (
      <p className={styles.many}>
        {label}: {points.length} points drawn by hand. Drag them on the drawing, or draw it again.
      </p>
    );
  const move = (index: number, p: PlanPoint) => commit(points.map((old, i) => (i === index ? p : old)));
  const after = (index: number): PlanPoint => {
    const a = points[index]!;
    const b = points[index + 1] ?? { x: a.x + 100, y: a.y };
    return { x: Math.round((a.x + b.x) / 2), y: Math.round((a.y + b.y) / 2) };
  };
  return (
    <details className={styles.points}>
      <summary id={id}>
        {label}: {points.length === 1 ? '1 point' : `${points.length} points`}
      </summary>
      <ol aria-labelledby={id}>
        {points.map((p, i) => (
          <li key={i}>
            <Coordinate
              label={`${label} ${i + 1}, to the right`}
              short="x"
              value={p.x}
              disabled={disabled}
              commit={(x) => move(i, { x, y: p.y })}
            />
            <Coordinate
              label={`${label} ${i + 1}, down`}
              short="y"
              value={p.y}
              disabled={disabled}
              commit={(y) => move(i, { x: p.x, y })}
            />
            {growing && !disabled && (
              <>
                <Button
                  kind="bare"
                  aria-label={`Add a point after ${label.toLowerCase()} ${i + 1}`}
                  onClick={() => commit([...points.slice(0, i + 1), after(i), ...points.slice(i + 1)])}
                >
                  +
                </Button>
                <Button
                  kind="bare"
                  disabled={points.length <= least}
                  aria-label={`Take out ${label.toLowerCase()} ${i + 1}`}
                  onClick={() => commit(points.filter((_, k) => k !== i))}
                >
                  −
                </Button>
              </>
            )}
          </li>
        ))}
      </ol>
      <p>Sheet pixels, from its upper left corner.</p>
    </details>
  );
}

/** The plan has no room farther out (the bound that records are checked against). */
const FARTHEST_PIXEL = 100_000;

interface CoordinateProps {
  readonly label: string;
  readonly short: string;
  readonly value: number;
  readonly disabled: boolean;
  readonly commit: (value: number) => void;
}

function Coordinate({ label, short, value, disabled, commit }: CoordinateProps) {
  const shown = `${Math.round(value * 10) / 10}`;
  const [draft, setDraft] = useState<{ readonly text: string; readonly of: string } | null>(null);
  const text = draft !== null && draft.of === shown ? draft.text : shown;
  const read = Number(text.trim().replace(',', '.').replace('−', '-'));
  const bad = text.trim() === '' || !Number.isFinite(read) || Math.abs(read) > FARTHEST_PIXEL;
  const take = () => {
    if (text === shown || bad) return;
    setDraft(null);
    commit(read);
  };
  return (
    <label>
      <span aria-hidden="true">{short}</span>
      <input
        aria-label={label}
        inputMode="decimal"
        autoComplete="off"
        disabled={disabled}
        aria-invalid={bad || undefined}
        value={text}
        onChange={(e) => setDraft({ text: e.target.value, of: shown })}
        onBlur={take}
        onKeyDown={(e) => {
          if (e.key === 'Enter') take();
          if (e.key === 'Escape' && text !== shown) {
            e.stopPropagation();
            setDraft(null);
          }
        }}
      />
    </label>
  );
}
