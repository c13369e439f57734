import { useQuery } from '@tanstack/react-query';
import { Button } from '../../components/button';
import { Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { Table as TableFrame } from '../../components/table';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { formatDay } from '../../lib/format';
import { type DoneImport, importsQuery, useUndoImport } from './api';
import styles from './import.module.css';

const told = ({ summary }: DoneImport): string =>
  [
    summary.added > 0 && `${summary.added} new`,
    summary.changed > 0 && `${summary.changed} changed`,
    summary.faults > 0 && `${summary.faults} not taken`,
  ]
    .filter(Boolean)
    .join(', ');

/** What was taken in so far, each with its undoing. */
export function PastImports() {
  const imports = useQuery(importsQuery);
  const undo = useUndoImport();
  const takeBack = (done: DoneImport) =>
    undo.mutate(done.id, {
      onSuccess: ({ kept }) =>
        showToast({
          message:
            kept.length === 0
              ? `${done.fileName} is taken back.`
              : `${done.fileName} is taken back. Changed since, and left as they are: ${kept.join(', ')}.`,
        }),
      onError: (error) => void showProblem(sentenceOf(error)),
    });
  if (imports.data?.length === 0) return null;
  return (
    <Section title="Taken in so far">
      {imports.isPending && <SkeletonRows rows={2} label="Loading earlier imports" />}
      {imports.isError && <Problem error={imports.error} onRetry={() => imports.refetch()} />}
      {imports.data && (
        <TableFrame label="Earlier imports">
          <thead>
            <tr>
              <th scope="col">File</th>
              <th scope="col">When</th>
              <th scope="col">What</th>
              <th scope="col">
                <span className={styles.hidden}>Undo</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {imports.data.map((done) => (
              <tr key={done.id}>
                <th scope="row" className={styles.head}>
                  {done.fileName}
                </th>
                <td>
                  {formatDay(done.at)}
                  {done.by && `, ${done.by}`}
                </td>
                <td>{told(done)}</td>
                <td className={styles.number}>
                  {done.undoneAt ? (
                    'Taken back'
                  ) : (
                    <Button
                      kind="bare"
                      busy={undo.isPending && undo.variables === done.id}
                      aria-label={`Take back ${done.fileName}`}
                      onClick={() => takeBack(done)}
                    >
                      Take back
                    </Button>
                  )}
                </td>
              </tr>
            ))}
          </tbody>
        </TableFrame>
      )}
    </Section>
  );
}
