import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useEffect, useMemo, useRef, useState } from 'react';
import { Button } from '../../components/button';
import { Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { showToast } from '../../components/toast';
import { useDebounced } from '../../lib/use-debounced';
import {
  type DefaultCategory,
  type ImportAsk,
  type Mapping,
  previewQuery,
  type Table,
  useTakeImport,
  useUndoImport,
} from './api';
import { ChooseFile } from './choose-file';
import { Columns } from './columns';
import styles from './import.module.css';
import { Preview } from './preview';
import { rowsText, takenText, undoneText } from './words';

interface ImporterProps {
  readonly categories: readonly { readonly value: DefaultCategory; readonly label: string }[];
  readonly onDone: () => void;
}

/** Rows are left out one after another, and the whole table goes along each time: it waits for the last. */
const SETTLED_MS = 600;

/** Takes a table into the catalogue: choose it, say what its columns are, look, take it in. */
export function Importer({ categories, onDone }: ImporterProps) {
  const [table, setTable] = useState<Table | null>(null);
  const [again, setAgain] = useState(false);
  if (table === null) return <ChooseFile again={again} onRead={setTable} />;
  const other = () => {
    setTable(null);
    setAgain(true);
  };
  return <ReadTable table={table} categories={categories} onDone={onDone} onOther={other} />;
}

function ReadTable({
  table,
  categories,
  onDone,
  onOther,
}: ImporterProps & { table: Table; onOther: () => void }) {
  const [mapping, setMapping] = useState<Mapping>(table.mapping);
  const [category, setCategory] = useState<DefaultCategory | null>(null);
  const [leftOut, setLeftOut] = useState<ReadonlySet<number>>(new Set());
  const ask = useMemo(
    (): ImportAsk => ({
      fileName: table.fileName,
      rows: table.rows,
      mapping,
      category,
      leftOut: [...leftOut],
    }),
    [table, mapping, category, leftOut],
  );
  const asked = useDebounced(ask, SETTLED_MS);
  const preview = useQuery({
    ...previewQuery(asked, useStamp(asked)),
    placeholderData: keepPreviousData,
  });
  const take = useTakeImport();
  const undo = useUndoImport();
  const told = preview.data;
  const useful = told ? told.added + told.changed : 0;
  const settled = asked === ask && !preview.isPlaceholderData && !preview.isError;
  const lede = useRef<HTMLSpanElement>(null);
  // The button that had the focus is gone.
  useEffect(() => lede.current?.focus({ preventScroll: true }), []);

  const takeIn = () =>
    take.mutate(ask, {
      onSuccess: ({ id, fileName, summary }) => {
        showToast({
          message: takenText(summary),
          undo: async () => {
            const { kept } = await undo.mutateAsync(id);
            showToast({ message: undoneText(fileName, kept) });
          },
        });
        onDone();
      },
    });

  return (
    <>
      <Section
        title="What the columns hold"
        lede={
          <span ref={lede} tabIndex={-1} className={styles.lede}>
            {table.fileName}, {rowsText(table.rows.length)} below the heads
          </span>
        }
        actions={<Button onClick={onOther}>Choose another file</Button>}
      >
        <Columns
          table={table}
          mapping={mapping}
          onMapping={setMapping}
          category={category}
          onCategory={setCategory}
          categories={categories}
        />
      </Section>
      <Section title="What would happen" lede="Rows are counted from the first below the heads.">
        {preview.isPending && <SkeletonRows rows={5} label="Looking through the rows" />}
        {preview.isError && <Problem error={preview.error} onRetry={() => preview.refetch()} />}
        {told && (
          <Preview
            preview={told}
            busy={preview.isFetching}
            columns={table.columns}
            leftOut={leftOut}
            onLeaveOut={(row, out) => {
              const next = new Set(leftOut);
              if (out) next.add(row);
              else next.delete(row);
              setLeftOut(next);
            }}
          />
        )}
        {take.isError && <Problem error={take.error} />}
        <div className={styles.foot}>
          <Button kind="lamp" busy={take.isPending} disabled={useful === 0 || !settled} onClick={takeIn}>
            {useful === 0 ? 'Nothing to take in' : `Take in ${useful} ${useful === 1 ? 'item' : 'items'}`}
          </Button>
          {told && told.faults > 0 && (
            <p>
              {told.faults === 1 ? 'One row' : `${told.faults} rows`} can’t be taken and will be left out.
            </p>
          )}
        </div>
      </Section>
    </>
  );
}

/** Another text whenever what is asked is another. */
function useStamp(ask: ImportAsk): string {
  const [held, setHeld] = useState(() => ({ ask, stamp: crypto.randomUUID() }));
  if (held.ask === ask) return held.stamp;
  const next = { ask, stamp: crypto.randomUUID() };
  setHeld(next);
  return next.stamp;
}
