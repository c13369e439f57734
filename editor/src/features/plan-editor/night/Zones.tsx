import type { ControlZone } from '@lampwright/geometry/light';
import { scheduleInWords } from '@lampwright/geometry/night';
import { useMemo } from 'react';
import { useNight, useNightController } from './context';
import styles from './light-panel.module.css';
import { zonesOn } from './moments';
import { Part } from './Part';

const choices = [
  { look: null, word: 'Timed', title: 'As scheduled' },
  { look: 'on', word: 'On', title: 'On, to look at' },
  { look: 'off', word: 'Off', title: 'Off, to look at' },
] as const;

/** The zones of the plan, each as scheduled or switched by hand for looking; the plan itself stays as it is. */
export function Zones() {
  const zones = useNight((s) => s.zones);
  const together = useNight((s) => s.together);
  const evening = useNight((s) => s.evening);
  const at = useNight((s) => s.at);
  const looks = useNight((s) => s.looks);
  const scene = useNight((s) => s.scene);
  const on = useMemo(() => zonesOn(evening, zones, at, looks), [evening, zones, at, looks]);
  if (zones.length === 0) return null;
  const here = scene === null ? null : new Set(scene.zones.map(({ id }) => id));
  return (
    <Part title="Zones">
      <ul className={styles.zones}>
        {zones.map((zone) => (
          <Zone
            key={zone.id}
            zone={zone}
            lit={on.has(zone.id)}
            look={looks.get(zone.id) ?? null}
            elsewhere={here !== null && !here.has(zone.id)}
          />
        ))}
      </ul>
      {together.length > 0 && (
        <ul className={styles.together}>
          {together.map((sentence) => (
            <li key={sentence}>{sentence}</li>
          ))}
        </ul>
      )}
    </Part>
  );
}

interface ZoneProps {
  readonly zone: ControlZone;
  readonly lit: boolean;
  readonly look: 'on' | 'off' | null;
  /** None of its lights is on this sheet. */
  readonly elsewhere: boolean;
}

function Zone({ zone, lit, look, elsewhere }: ZoneProps) {
  const night = useNightController();
  return (
    <li className={styles.zone}>
      <span className={styles.lamp} data-lit={lit || undefined} aria-hidden="true" />
      <span className={styles.name}>
        {zone.name}
        <span className={styles.detail}>
          {scheduleInWords(zone.schedule)}
          {elsewhere && ', on another sheet'}
        </span>
      </span>
      <fieldset className={styles.looks} aria-label={`${zone.name}, ${lit ? 'on' : 'off'}`}>
        {choices.map((choice) => (
          <button
            key={choice.word}
            type="button"
            aria-pressed={look === choice.look}
            title={choice.title}
            onClick={() => night.lookAtZone(zone.id, choice.look)}
          >
            {choice.word}
          </button>
        ))}
      </fieldset>
    </li>
  );
}
