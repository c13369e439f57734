import type { CatalogueCategory } from '@lampwright/geometry/catalogue';
import { type ReactNode, useId, useState } from 'react';
import type { PickItem } from './items';
import styles from './picker.module.css';

interface ItemPickerProps<C extends CatalogueCategory> {
  readonly label: string;
  readonly picks: readonly PickItem<C>[];
  readonly chosen: PickItem<C> | undefined;
  readonly detail: (pick: PickItem<C>) => ReactNode;
  readonly onPick: (pick: PickItem<C>) => void;
}

/** From this many on, a list has a field to search it. */
const SEARCH_FROM = 6;

/** The first nine are chosen by their digit. */
function digitOf(index: number): string {
  return index < 9 ? String(index + 1) : '';
}

/** A short list to choose an item from; the first nine answer to their digits. */
export function ItemPicker<C extends CatalogueCategory>({
  label,
  picks,
  chosen,
  detail,
  onPick,
}: ItemPickerProps<C>) {
  const [search, setSearch] = useState('');
  const name = useId();
  const words = search.trim().toLowerCase().split(/\s+/).filter(Boolean);
  const found = picks.filter((p) => words.every((w) => p.item.name.toLowerCase().includes(w)));
  return (
    <fieldset className={styles.picker}>
      <legend>{label}</legend>
      {picks.length >= SEARCH_FROM && (
        <input
          type="search"
          aria-label={`Search: ${label.toLowerCase()}`}
          placeholder="Search…"
          value={search}
          onChange={(event) => setSearch(event.target.value)}
        />
      )}
      <div className={styles.list}>
        {found.map((pick) => (
          <label key={pick.key} className={styles.pick}>
            <input
              type="radio"
              name={name}
              checked={pick.key === chosen?.key}
              onChange={() => onPick(pick)}
            />
            <kbd className={styles.digit}>{digitOf(picks.indexOf(pick))}</kbd>
            <span className={styles.name}>{pick.item.name}</span>
            <span className={styles.detail}>{detail(pick)}</span>
          </label>
        ))}
        {found.length === 0 && (
          <p className={styles.none}>
            {picks.length === 0 ? 'The catalogue has none yet.' : `Nothing is called “${search}”.`}
          </p>
        )}
      </div>
    </fieldset>
  );
}
