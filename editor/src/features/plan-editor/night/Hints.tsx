import { useEditor, useScale, useSheet } from '../page/context';
import { useNight, useNightController } from './context';
import styles from './light-panel.module.css';

/** What the picture wants for before it is whole, with a button that does it. */
export function Hints() {
  const editor = useEditor();
  const night = useNightController();
  const sheet = useSheet();
  const scale = useScale();
  const scene = useNight((s) => s.scene);
  const work = useNight((s) => s.work);
  if (sheet === undefined) return null;
  if (scale === null)
    return (
      <div className={styles.hint}>
        <p>Light falls by distance: this sheet needs its scale before its lights can be shown.</p>
        {editor.canEdit && (
          <button type="button" onClick={() => editor.use('scale')}>
            Set the scale
          </button>
        )}
      </div>
    );
  if (work.is === 'failed')
    return (
      <div className={styles.hint} role="alert">
        <p>The night picture could not be worked out: {work.message}</p>
        <button type="button" onClick={() => night.retry()}>
          Try again
        </button>
      </div>
    );
  if (scene === null) return null;
  if (scene.sources.length === 0)
    return (
      <div className={styles.hint}>
        <p>No light shines on this sheet yet. Place fixtures, and the evening shows what they do.</p>
        {editor.canEdit && (
          <button type="button" onClick={() => editor.use('fixture')}>
            Place a fixture
          </button>
        )}
      </div>
    );
  if (sheet.view === 'photo' && scene.faces.length === 0)
    return (
      <div className={styles.hint}>
        <p>Mark the house face so that light climbs it. Until then it falls on the ground alone.</p>
        {editor.canEdit && (
          <button type="button" onClick={() => editor.use('face')}>
            Mark the house face
          </button>
        )}
      </div>
    );
  return null;
}
