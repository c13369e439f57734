import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { Button } from '../../components/button';
import { Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
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

interface ImporterProps {
  readonly categories: readonly { readonly value: DefaultCategory; readonly label: string }[];
  readonly onDone: () => void;
}

/** Takes a table into the catalogue: choose it, say what its columns are, look, take it in. */
export function Importer({ categories, onDone }: ImporterProps) {
  const [table, setTable] = useState<Table | null>(null);
  if (table === null) return <ChooseFile onRead={setTable} />;
  return <ReadTable table={table} categories={categories} onDone={onDone} onOther={() => setTable(null)} />;
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
  const stamp = useStamp(ask);
  const preview = useQuery({ ...previewQuery(ask, stamp), placeholderData: keepPreviousData });
  const take = useTakeImport();
  const undo = useUndoImport();
  const told = preview.data;
  const useful = told ? told.added + told.changed : 0;

  const takeIn = () =>
    take.mutate(ask, {
      onSuccess: ({ id, summary }) => {
        showToast({
          message: `${summary.added} new and ${summary.changed} changed items are in the catalogue.`,
          undo: () => undo.mutateAsync(id),
        });
        onDone();
      },
    });

  return (
    <>
      <Section
        title="What the columns hold"
        lede={`${table.fileName}, ${table.rows.length} ${table.rows.length === 1 ? 'row' : 'rows'}`}
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
      <Section title="What would happen">
        {preview.isPending && <SkeletonRows rows={5} label="Looking through the rows" />}
        {preview.isError && <Problem error={preview.error} onRetry={() => preview.refetch()} />}
        {told && (
          <div
            className={preview.isPlaceholderData ? styles.pending : undefined}
            aria-busy={preview.isFetching}
          >
            <Preview
              preview={told}
              columns={table.columns}
              leftOut={leftOut}
              onLeaveOut={(row, out) => {
                const next = new Set(leftOut);
                if (out) next.add(row);
                else next.delete(row);
                setLeftOut(next);
              }}
            />
          </div>
        )}
        <div className={styles.foot}>
          <Button
            kind="lamp"
            busy={take.isPending}
            disabled={useful === 0 || preview.isPlaceholderData}
            onClick={takeIn}
          >
            {useful === 0 ? 'Nothing to take in' : `Take in ${useful} ${useful === 1 ? 'item' : 'items'}`}
          </Button>
          {told && told.faults > 0 && (
            <p>
              {told.faults === 1 ? 'One row' : `${told.faults} rows`} can’t be taken and will be left out.
            </p>
          )}
        </div>
        {take.isError && <Problem error={sentenceOf(take.error)} />}
      </Section>
    </>
  );
}

/** A number that is another whenever what is asked is another: tables are too large to be keys themselves. */
function useStamp(ask: ImportAsk): number {
  const [held, setHeld] = useState({ ask, stamp: 1 });
  if (held.ask === ask) return held.stamp;
  setHeld({ ask, stamp: held.stamp + 1 });
  return held.stamp + 1;
}
