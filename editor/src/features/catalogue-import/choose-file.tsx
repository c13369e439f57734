import { type DragEvent, useEffect, useId, useRef, useState } from 'react';
import { Button } from '../../components/button';
import { Problem } from '../../components/states';
import { type Table, useReadTable } from './api';
import styles from './import.module.css';

interface ChooseFileProps {
  /** Another one was there before: the keyboard goes on here. */
  readonly again: boolean;
  readonly onRead: (table: Table) => void;
}

/** The first step: a file, by button or dropped. */
export function ChooseFile({ again, onRead }: ChooseFileProps) {
  const read = useReadTable();
  const [over, setOver] = useState(false);
  const input = useRef<HTMLInputElement>(null);
  const button = useRef<HTMLButtonElement>(null);
  const hint = useId();
  useEffect(() => {
    if (again) button.current?.focus();
  }, [again]);
  const take = (file: File | undefined) => {
    if (file && !read.isPending) read.mutate(file, { onSuccess: onRead });
  };
  const hover = (event: DragEvent) => {
    event.preventDefault();
    setOver(true);
  };
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: dropping is a shortcut; the button does the same.
    <div
      className={styles.drop}
      data-over={over ? '' : undefined}
      onDragEnter={hover}
      onDragOver={hover}
      onDragLeave={() => setOver(false)}
      onDrop={(event) => {
        event.preventDefault();
        setOver(false);
        take(event.dataTransfer.files[0]);
      }}
    >
      <div id={hint}>
        <p>
          A supplier’s price list or your own table, as CSV or XLSX: heads of the columns first, one item a
          row, at most 5,000 rows. Nothing is changed before you have seen what would be.
        </p>
        <p className={styles.quiet}>
          Items are found again by their entry, their order number, or their name. A cell that is empty leaves
          what the catalogue says.
        </p>
      </div>
      <input
        ref={input}
        type="file"
        accept=".csv,.txt,.tsv,.xlsx,text/csv"
        className="visually-hidden"
        // The button beside it is the way by keyboard.
        tabIndex={-1}
        aria-label="Table of items"
        onChange={(event) => {
          take(event.target.files?.[0]);
          // The same file may be chosen again, mended.
          event.target.value = '';
        }}
      />
      <Button
        ref={button}
        kind="strong"
        busy={read.isPending}
        aria-describedby={hint}
        onClick={() => input.current?.click()}
      >
        {read.isPending ? 'Reading the table' : 'Choose a file'}
      </Button>
      {read.isError && <Problem error={read.error} />}
    </div>
  );
}
