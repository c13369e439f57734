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
import { summaryText, undoneText } from './words';

/** What was taken in so far, each with its undoing. */
export function PastImports() {
  const imports = useQuery(importsQuery);
  const undo = useUndoImport();
  const takeBack = (done: DoneImport) =>
    undo.mutate(done.id, {
      onSuccess: ({ kept }) => void showToast({ message: undoneText(done.fileName, kept) }),
      onError: (error) => void showProblem(sentenceOf(error)),
    });
  if (imports.data?.length === 0) return null;
  return (
    <Section title="Taken in so far" lede="The newest 50. Taking one back archives what it added.">
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
                <span className="visually-hidden">Undo</span>
              </th>
            </tr>
          </thead>
          <tbody>
            {imports.data.map((done) => (
              <tr key={done.id}>
                <th scope="row" className={styles.head}>
                  {done.fileName}
                </th>
                <td className={styles.when}>
                  {formatDay(done.at)}
                  {done.by && <span className={styles.by}>{done.by}</span>}
                </td>
                <td>{summaryText(done.summary)}</td>
                <td className={styles.take}>
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
