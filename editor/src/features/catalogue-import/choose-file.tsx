import { useId, useRef } from 'react';
import { Button } from '../../components/button';
import { Problem } from '../../components/states';
import { type Table, useReadTable } from './api';
import styles from './import.module.css';

/** The first step: a file, by button or dropped. */
export function ChooseFile({ onRead }: { onRead: (table: Table) => void }) {
  const read = useReadTable();
  const input = useRef<HTMLInputElement>(null);
  const hint = useId();
  const take = (file: File | undefined) => {
    if (file) read.mutate(file, { onSuccess: onRead });
  };
  return (
    // biome-ignore lint/a11y/noStaticElementInteractions: dropping is a shortcut; the button does the same.
    <div
      className={styles.drop}
      onDragOver={(event) => event.preventDefault()}
      onDrop={(event) => {
        event.preventDefault();
        take(event.dataTransfer.files[0]);
      }}
    >
      <p id={hint}>
        A supplier’s price list or your own table, as CSV or XLSX: heads of the columns first, one item a row,
        at most 5,000 rows. Nothing is changed before you have seen what would be.
      </p>
      <input
        ref={input}
        type="file"
        accept=".csv,.txt,.tsv,.xlsx,text/csv"
        className={styles.file}
        aria-label="Table of items"
        aria-describedby={hint}
        onChange={(event) => {
          take(event.target.files?.[0]);
          event.target.value = '';
        }}
      />
      <Button kind="strong" busy={read.isPending} onClick={() => input.current?.click()}>
        {read.isPending ? 'Reading the table' : 'Choose a file'}
      </Button>
      {read.isError && <Problem error={read.error} />}
    </div>
  );
}
