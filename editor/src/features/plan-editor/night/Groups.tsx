import { useNight, useNightController, useNightHere } from './context';
import styles from './light-panel.module.css';
import { Part } from './Part';

/** The groups that the homeowner may take or leave, to see the garden with and without. */
export function Groups() {
  const night = useNightController();
  const { groups } = useNightHere();
  const off = useNight((s) => s.groupsOff);
  if (groups.length === 0) return null;
  return (
    <Part title="Offered groups">
      <ul className={styles.groups}>
        {groups.map(({ id, name }) => (
          <li key={id}>
            <label>
              <input
                type="checkbox"
                checked={!off.has(id)}
                onChange={(event) => night.takeGroup(id, event.target.checked)}
              />
              {name}
            </label>
          </li>
        ))}
      </ul>
    </Part>
  );
}
