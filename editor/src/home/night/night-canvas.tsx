import type { NightScene } from '@lampwright/geometry/light';
import { type CSSProperties, useEffect, useLayoutEffect, useRef, useState } from 'react';
import styles from './night-canvas.module.css';
import { Painter, type Shown } from './painter';

interface Props {
  readonly scene: NightScene;
  /** Loaded. */
  readonly photo: HTMLImageElement;
  /** What it has loaded: another one is drawn anew. */
  readonly source: string;
  readonly shown: Shown;
  /** The photo itself is looked at. */
  readonly hidden: boolean;
  /** Where the photo lies. */
  readonly style: CSSProperties;
  readonly onFailed: (error: unknown) => void;
}

/**
 * The evening over the photo. While the page is in the background nothing of it is kept: phones have little
 * memory for pictures.
 */
export function NightCanvas(props: Props) {
  const visible = useVisible();
  if (!visible) return null;
  // What was drawn on once can't be begun anew.
  return <Drawn key={`${props.scene.sheetId} ${props.source}`} {...props} />;
}

function Drawn({ scene, photo, shown, hidden, style, onFailed }: Props) {
  const frame = useRef<HTMLDivElement>(null);
  const painter = useRef<Painter | null>(null);
  const [drawn, setDrawn] = useState(false);
  const latest = useRef({ shown, onFailed });
  latest.current = { shown, onFailed };

  useEffect(() => {
    // Each run has a canvas of its own: a context that was given back is not given again.
    const canvas = document.createElement('canvas');
    frame.current?.append(canvas);
    let gone = false;
    const fail = (error: unknown): void => {
      if (gone) return;
      setDrawn(false);
      latest.current.onFailed(error);
    };
    try {
      painter.current = new Painter(canvas, photo, scene, {
        onDrawn: () => setDrawn(true),
        onFailed: fail,
      });
      painter.current.show(latest.current.shown);
    } catch (error) {
      fail(error);
    }
    return () => {
      gone = true;
      painter.current?.dispose();
      painter.current = null;
      canvas.remove();
    };
  }, [photo, scene]);

  useLayoutEffect(() => painter.current?.show(shown), [shown]);

  return (
    <div ref={frame} className={styles.night} style={style} data-drawn={(drawn && !hidden) || undefined} />
  );
}

function useVisible(): boolean {
  const [visible, setVisible] = useState(() => document.visibilityState !== 'hidden');
  useEffect(() => {
    const note = (): void => setVisible(document.visibilityState !== 'hidden');
    document.addEventListener('visibilitychange', note);
    return () => document.removeEventListener('visibilitychange', note);
  }, []);
  return visible;
}
