import { type KeyboardEvent, type MouseEvent, useEffect, useRef, useState } from 'react';
import styles from './stage.module.css';
import type { Spot } from './view';

const STEP = 0.02;
const LONG_STEP = 0.1;

interface Props {
  /** In shares of the frame. */
  readonly onPlace: (spot: Spot) => void;
  readonly onCancel: () => void;
}

/** Lies over the picture while a place is looked for: press it, or move the cross by arrow keys and Enter. */
export function Crosshair({ onPlace, onCancel }: Props) {
  const button = useRef<HTMLButtonElement>(null);
  const [spot, setSpot] = useState<Spot>({ x: 0.5, y: 0.5 });

  useEffect(() => button.current?.focus({ preventScroll: true }), []);

  const move = (dx: number, dy: number): void => {
    const within = (n: number): number => Math.min(1, Math.max(0, n));
    setSpot({ x: within(spot.x + dx), y: within(spot.y + dy) });
  };

  const keys = (event: KeyboardEvent): void => {
    const step = event.shiftKey ? LONG_STEP : STEP;
    switch (event.key) {
      case 'ArrowLeft':
        move(-step, 0);
        break;
      case 'ArrowRight':
        move(step, 0);
        break;
      case 'ArrowUp':
        move(0, -step);
        break;
      case 'ArrowDown':
        move(0, step);
        break;
      case 'Escape':
        onCancel();
        break;
      default:
        return;
    }
    event.preventDefault();
    event.stopPropagation();
  };

  const press = (event: MouseEvent): void => {
    const box = event.currentTarget.getBoundingClientRect();
    // Pressed by keyboard it has no place of its own: the cross does.
    if (event.detail === 0) onPlace(spot);
    else onPlace({ x: (event.clientX - box.left) / box.width, y: (event.clientY - box.top) / box.height });
  };

  return (
    <button
      ref={button}
      type="button"
      className={styles.crosshair}
      aria-label={`Cross at ${Math.round(spot.x * 100)} percent from the left, ${Math.round(spot.y * 100)} percent from the top. Arrow keys move it, Enter takes this place, Escape stops.`}
      onKeyDown={keys}
      onClick={press}
    >
      <svg
        className={styles.cross}
        style={{ left: `${spot.x * 100}%`, top: `${spot.y * 100}%` }}
        viewBox="-20 -20 40 40"
        aria-hidden="true"
        focusable="false"
      >
        <path d="M0 -18V-5M0 5V18M-18 0H-5M5 0H18" stroke="var(--paper)" strokeWidth="6" />
        <path d="M0 -18V-5M0 5V18M-18 0H-5M5 0H18" stroke="var(--ink)" strokeWidth="2.4" />
      </svg>
    </button>
  );
}
