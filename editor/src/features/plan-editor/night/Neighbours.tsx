import { useFigures } from './context';
import styles from './light-panel.module.css';
import { Part } from './Part';
import { Rows } from './Rows';

/** What neighbours or the night sky may mind, with every light on that is not switched off here. */
export function Neighbours() {
  const answer = useFigures((s) => s.answer);
  if (answer === null) return null;
  return (
    <Part title="Good neighbour">
      {answer.cautions.length === 0 ? (
        <p className={styles.small}>
          Nothing to mind: no stray light worth telling past the lot line or into the sky, none colder than
          3000 K. Local rules decide.
        </p>
      ) : (
        <Rows
          rows={answer.cautions.map(({ recordIds, text }) => ({ recordId: recordIds[0] ?? null, text }))}
        />
      )}
    </Part>
  );
}
