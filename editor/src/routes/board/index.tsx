import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { paths, to } from '../../app/paths';
import { LinkButton } from '../../components/button';
import { Page } from '../../components/page';
import { Empty, Problem, SkeletonRows } from '../../components/states';
import { BoardView } from '../../features/board';
import { boardQuery } from '../../features/board/api';
import { useAbilities } from '../../lib/me';
import { stageSchema } from '../../lib/stages';

export default function BoardScreen() {
  const board = useQuery(boardQuery);
  const { editJobs } = useAbilities();
  const [params, setParams] = useSearchParams();
  const asked = stageSchema.safeParse(params.get('stage'));
  const columns = board.data?.columns ?? [];
  // On a phone the first stage that has something is where one begins.
  const stage = asked.success
    ? asked.data
    : (columns.find(({ count }) => count > 0)?.stage ?? columns[0]?.stage ?? 'enquiry');
  const nothing = board.isSuccess && columns.every(({ count }) => count === 0);
  return (
    <Page title="Board" wide>
      {board.isPending && <SkeletonRows rows={6} label="Loading the board" />}
      {board.isError && board.data === undefined && (
        <Problem error={board.error} onRetry={() => board.refetch()} />
      )}
      {nothing && (
        <Empty
          title="No jobs yet"
          action={
            editJobs ? (
              <LinkButton to={paths.newJob} kind="lamp">
                New job
              </LinkButton>
            ) : undefined
          }
        >
          Jobs stand here by stage, with what is owed next and by whom.
        </Empty>
      )}
      {board.data && !nothing && (
        <BoardView
          board={board.data}
          editable={editJobs}
          stage={stage}
          onStage={(next) => setParams({ stage: next }, { replace: true })}
          hrefOf={to.job}
          listHref={(of) => `${paths.jobs}?stage=${of}`}
        />
      )}
    </Page>
  );
}
