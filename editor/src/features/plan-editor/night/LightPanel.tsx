import { BrightSpot } from './BrightSpot';
import { useNight } from './context';
import { Figures } from './Figures';
import { Groups } from './Groups';
import { Hints } from './Hints';
import { LampNotes } from './LampNotes';
import styles from './light-panel.module.css';
import { Neighbours } from './Neighbours';
import { Zones } from './Zones';

/** The light of the open sheet: what is switched on, how bright it is shown, its figures, and what to mind. */
export function LightPanel({ jobName }: { readonly jobName: string }) {
  const hasScale = useNight((s) => s.scene !== null);
  return (
    <section className={styles.panel} aria-labelledby="light-title">
      <h2 id="light-title" className="visually-hidden">
        Light
      </h2>
      <Hints />
      <Zones />
      <Groups />
      {hasScale && (
        <>
          <BrightSpot />
          <Figures jobName={jobName} />
          <Neighbours />
          <LampNotes />
        </>
      )}
    </section>
  );
}
