import { useCamera, useEditor } from './context';
import styles from './page.module.css';

const STEP = 1.25;

export function ZoomBar() {
  const editor = useEditor();
  const percent = useCamera((s) => Math.round(s.camera.zoom * 100));
  const { camera } = editor;
  return (
    <fieldset className={styles.zoom} aria-label="View">
      <button type="button" aria-label="Zoom out" onClick={() => camera.zoom(1 / STEP)}>
        −
      </button>
      <button
        type="button"
        aria-label={`Zoom is ${percent} percent; show at 100 percent`}
        className={styles.percent}
        onClick={() => camera.zoom(1 / camera.camera.zoom)}
      >
        {percent} %
      </button>
      <button type="button" aria-label="Zoom in" onClick={() => camera.zoom(STEP)}>
        +
      </button>
      <button type="button" onClick={() => camera.fit()}>
        Fit
      </button>
      <button
        type="button"
        onClick={() => editor.zoomToSelection()}
        title="Zoom to what is chosen, else to the plan (2)"
      >
        Focus
      </button>
    </fieldset>
  );
}
