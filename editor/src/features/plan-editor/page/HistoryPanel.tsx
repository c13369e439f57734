import { useInfiniteQuery, useMutation } from '@tanstack/react-query';
import { Button } from '../../../components/button';
import { Problem, SkeletonRows } from '../../../components/states';
import { sentenceOf } from '../../../lib/api/client';
import { useEditor, usePlan } from './context';
import { PanelFrame } from './PanelFrame';
import styles from './page.module.css';
import { readHistory, restoreVersion } from './server';

const moment = new Intl.DateTimeFormat(undefined, { dateStyle: 'medium', timeStyle: 'short' });

/** Who changed what, newest first, and the way back to how the plan was. */
export function HistoryPanel({ jobId }: { readonly jobId: string }) {
  const editor = useEditor();
  const saved = usePlan((s) => s.save.kind === 'saved');
  const history = useInfiniteQuery({
    queryKey: ['plan-history', jobId],
    queryFn: ({ pageParam }) => readHistory(jobId, pageParam),
    initialPageParam: null as number | null,
    getNextPageParam: (page) => page.next,
    gcTime: 0,
    staleTime: 0,
  });
  const restore = useMutation({
    mutationFn: (version: number) => restoreVersion(jobId, version),
    onSuccess: (_, version) => {
      editor.session.setState({ message: `The plan is as it was at version ${version} again.` });
      void history.refetch();
    },
    onError: (error) => editor.session.setState({ message: sentenceOf(error) }),
  });
  const items = history.data?.pages.flatMap((page) => page.items) ?? [];
  return (
    <PanelFrame title="History">
      {history.isPending && <SkeletonRows rows={6} label="Loading the history" />}
      {history.isError && <Problem error={history.error} onRetry={() => void history.refetch()} />}
      {history.isSuccess && items.length === 0 && (
        <p className={styles.calm}>Nothing has been changed yet.</p>
      )}
      {items.length > 0 && (
        <ol className={styles.versions}>
          {items.map((item, i) => (
            <li key={item.version}>
              <span>
                {item.label}
                <span className={styles.quiet}>
                  {' '}
                  · {item.author === null ? 'Lampwright' : item.author.name || 'a former member'} ·{' '}
                  <time dateTime={item.at}>{moment.format(new Date(item.at))}</time>
                </span>
              </span>
              {editor.canEdit && i > 0 && (
                <Button
                  kind="bare"
                  busy={restore.isPending && restore.variables === item.version}
                  disabled={!saved}
                  aria-label={`Restore the plan as of ${item.label}, version ${item.version}`}
                  onClick={() => restore.mutate(item.version)}
                >
                  Restore
                </Button>
              )}
            </li>
          ))}
        </ol>
      )}
      {history.hasNextPage && (
        <Button busy={history.isFetchingNextPage} onClick={() => void history.fetchNextPage()}>
          Earlier
        </Button>
      )}
    </PanelFrame>
  );
}
