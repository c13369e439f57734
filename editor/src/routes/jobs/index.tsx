import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { paths, to } from '../../app/paths';
import { Button, LinkButton } from '../../components/button';
import { PlusIcon } from '../../components/icons';
import { Page } from '../../components/page';
import { Pager } from '../../components/pager';
import { Empty, Problem, SkeletonRows } from '../../components/states';
import { jobListQuery } from '../../features/jobs/api';
import { JobFilters } from '../../features/jobs/job-filters';
import { JobTable } from '../../features/jobs/job-table';
import { changeAsk, type ListAsk, readAsk, sortBy, writeAsk } from '../../features/jobs/list-ask';
import { useAbilities } from '../../lib/me';

export default function JobsScreen() {
  const [params, setParams] = useSearchParams();
  const ask = readAsk(params);
  const jobs = useQuery(jobListQuery(ask));
  const { editJobs } = useAbilities();
  const setAsk = (next: ListAsk) => setParams(writeAsk(next), { replace: next.search !== ask.search });
  const filtered = ask.search !== '' || ask.stage !== null || ask.archived;
  const newJob = (
    <LinkButton to={paths.newJob} kind="lamp">
      <PlusIcon />
      New job
    </LinkButton>
  );
  const nothing = jobs.data?.total === 0;
  const newcomer = nothing && !filtered;

  return (
    <Page title="Jobs" actions={editJobs && !newcomer ? newJob : undefined}>
      {!newcomer && <JobFilters ask={ask} onAsk={setAsk} />}
      {jobs.isPending && <SkeletonRows rows={8} label="Loading jobs" />}
      {jobs.isError && <Problem error={jobs.error} onRetry={() => jobs.refetch()} />}
      {newcomer && (
        <Empty title="No jobs yet" action={editJobs ? newJob : undefined}>
          {editJobs
            ? 'A job holds the client, the yard photo or plot plan, and the plan drawn over it. Begin with whoever called last.'
            : 'Once an owner or designer makes a job, it is listed here with its plan.'}
        </Empty>
      )}
      {nothing && filtered && (
        <Empty
          title={
            ask.archived && ask.search === '' && ask.stage === null ? 'Nothing is archived' : 'No job matches'
          }
          action={
            <Button onClick={() => setAsk(changeAsk(ask, { search: '', stage: null, archived: false }))}>
              Show all current jobs
            </Button>
          }
        >
          {ask.archived
            ? 'Jobs that you archive leave the list and are kept here.'
            : 'Try fewer letters or another stage. Names, clients and addresses are searched.'}
        </Empty>
      )}
      {jobs.data && !nothing && (
        <>
          <JobTable
            jobs={jobs.data.items}
            ask={ask}
            hrefOf={to.job}
            onSort={(sort) => setAsk(sortBy(ask, sort))}
            stale={jobs.isPlaceholderData}
          />
          <Pager
            page={jobs.data.page}
            pageSize={jobs.data.pageSize}
            total={jobs.data.total}
            noun={ask.archived ? 'archived jobs' : 'jobs'}
            onPage={(page) => setAsk({ ...ask, page })}
          />
        </>
      )}
    </Page>
  );
}
