import { BrightSpot } from './BrightSpot';
import { useNight } from './context';
import { Groups } from './Groups';
import { Hints } from './Hints';
import { LampNotes } from './LampNotes';
import styles from './light-panel.module.css';
import { Zones } from './Zones';

/** The light of the open sheet: what is switched on, how bright it is shown, and what to know of it. */
export function LightPanel(_: { readonly jobName: string }) {
  const hasScale = useNight((s) => s.scene !== null);
  return (
    <section className={styles.panel} aria-labelledby="light-title">
      <h2 id="light-title" className="visually-hidden">
        Light
      </h2>
      <Hints />
      <Zones />
      <Groups />
      {hasScale && <BrightSpot />}
      {hasScale && <LampNotes />}
    </section>
  );
}
