import { type PlanDocument, recordOf } from '@lampwright/geometry/plan';
import { type Point, toWindow } from '../../../plan-view/camera';
import { useCamera, useDoc, useSession, useTools } from './context';
import styles from './pins.module.css';

/** Something said about the plan, shown where it is about: a record, or a point of a sheet in its pixels. */
export interface Pin {
  readonly id: string;
  /** What it is, for those who don't see it. */
  readonly label: string;
  readonly recordId: string | null;
  readonly sheetId: string | null;
  readonly x: number | null;
  readonly y: number | null;
}

interface Placed {
  readonly id: string;
  readonly label: string;
  readonly at: Point;
}

/** Where the pins of one sheet are; one whose light is gone is nowhere. */
export function placePins(pins: readonly Pin[], doc: PlanDocument, sheetId: string): Placed[] {
  const placed: Placed[] = [];
  for (const { id, label, recordId, sheetId: onSheet, x, y } of pins) {
    const fixture = recordId === null ? undefined : recordOf(doc, recordId, 'fixture');
    if (fixture !== undefined && fixture.sheetId === sheetId) placed.push({ id, label, at: fixture.at });
    else if (recordId === null && onSheet === sheetId && x !== null && y !== null)
      placed.push({ id, label, at: { x, y } });
  }
  return placed;
}

interface PinsProps {
  readonly pins: readonly Pin[];
  readonly onPin: (id: string) => void;
}

/** Pins over the drawing. While a tool draws they step back, so that nothing is in its way. */
export function Pins({ pins, onPin }: PinsProps) {
  const doc = useDoc();
  const sheetId = useSession((s) => s.sheetId);
  const camera = useCamera((s) => s.camera);
  const resting = useTools((s) => s.toolId === 'select');
  const placed = placePins(pins, doc, sheetId);
  if (placed.length === 0) return null;
  return (
    <ul className={styles.pins} aria-label="Questions on this sheet" data-resting={resting ? '' : undefined}>
      {placed.map(({ id, label, at }) => {
        const p = toWindow(camera, at);
        return (
          <li key={id} style={{ transform: `translate(${p.x}px, ${p.y}px)` }}>
            <button
              type="button"
              aria-label={label}
              title={label}
              disabled={!resting}
              onClick={() => onPin(id)}
            >
              <svg viewBox="0 0 30 34" width="30" height="34" aria-hidden="true">
                <path d="M15 2a12.5 12.5 0 0 1 0 25h-3L5 33l1.5-8.5A12.5 12.5 0 0 1 15 2z" />
                <text x="15" y="19.5">
                  ?
                </text>
              </svg>
            </button>
          </li>
        );
      })}
    </ul>
  );
}
