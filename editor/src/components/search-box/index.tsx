import { useEffect, useRef, useState } from 'react';
import { SearchIcon } from '../icons';
import styles from './search-box.module.css';

interface SearchBoxProps {
  readonly label: string;
  readonly value: string;
  /** Told once the typing pauses, and at once on Enter. */
  readonly onSearch: (text: string) => void;
}

const PAUSE_MS = 250;

export function SearchBox({ label, value, onSearch }: SearchBoxProps) {
  const [text, setText] = useState(value);
  const timer = useRef<ReturnType<typeof setTimeout>>(undefined);
  const told = useRef(value);

  // The address may change from outside (back button, "clear"): follow it.
  useEffect(() => {
    if (value === told.current) return;
    told.current = value;
    setText(value);
  }, [value]);
  useEffect(() => () => clearTimeout(timer.current), []);

  const tell = (next: string) => {
    clearTimeout(timer.current);
    told.current = next.trim();
    onSearch(next.trim());
  };

  return (
    <search className={styles.box}>
      <span className={styles.icon}>
        <SearchIcon />
      </span>
      <input
        type="search"
        className={styles.input}
        aria-label={label}
        placeholder={label}
        maxLength={120}
        value={text}
        onChange={(event) => {
          const next = event.target.value;
          setText(next);
          clearTimeout(timer.current);
          timer.current = setTimeout(() => tell(next), next === '' ? 0 : PAUSE_MS);
        }}
        onKeyDown={(event) => {
          if (event.key === 'Enter') tell(text);
        }}
      />
    </search>
  );
}
