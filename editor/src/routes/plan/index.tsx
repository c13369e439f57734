import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { useLocation, useParams, useSearchParams } from 'react-router-dom';
import { paths, to } from '../../app/paths';
import { Page } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import {
  EditorContext,
  HistoryPanel,
  litOf,
  PlanPage,
  readCatalogue,
  usePlanEditor,
} from '../../features/plan-editor';
import { type Job, jobQuery } from '../../lib/jobs';
import { useAbilities, useMe } from '../../lib/me';
import { useUnits } from '../../lib/units';
import { useEvening } from './use-evening';
import { useQuestions } from './use-questions';

export default function PlanScreen() {
  const { jobId = '' } = useParams();
  const job = useQuery(jobQuery(jobId));
  const { company } = useMe();
  const back = { to: paths.jobs, label: 'Jobs' };
  if (job.isPending) return <Opening />;
  if (job.isError || company === null)
    return (
      <Page title="Plan" back={back}>
        <Problem
          error={job.error ?? 'You belong to no company, so there is no plan to show.'}
          onRetry={() => void job.refetch()}
        />
      </Page>
    );
  return <Plan key={jobId} job={job.data} companyId={company.id} />;
}

function Opening() {
  return (
    <Page title="Plan">
      <SkeletonRows rows={8} label="Opening the plan" />
    </Page>
  );
}

function Plan({ job, companyId }: { readonly job: Job; readonly companyId: string }) {
  const { user } = useMe();
  const { editPlan } = useAbilities();
  const units = useUnits();
  const [search] = useSearchParams();
  const location = useLocation();
  const canEdit = editPlan && job.archivedAt === null;
  const opening = usePlanEditor(
    { userId: user.id, companyId, jobId: job.id },
    canEdit,
    search.get('sheet'),
    litOf(location.search, location.hash),
  );
  const catalogue = useQuery({ queryKey: ['plan-catalogue', companyId], queryFn: readCatalogue });
  const images = useMemo(() => new Map(job.sheets.map((sheet) => [sheet.id, sheet.imageUrl])), [job.sheets]);
  const entries = useMemo(() => catalogue.data ?? [], [catalogue.data]);
  const here = useEvening(job);
  const questions = useQuestions(job, opening.is === 'open' ? opening.editor : null);
  switch (opening.is) {
    case 'loading':
      return <Opening />;
    case 'failed':
      return (
        <Page title="Plan" back={{ to: to.job(job.id), label: job.name }}>
          <Problem error={opening.message} onRetry={opening.retry} />
        </Page>
      );
    case 'open':
      return (
        <EditorContext value={{ editor: opening.editor, units }}>
          <PlanPage
            jobName={job.name}
            jobTo={to.job(job.id)}
            jobsTo={paths.jobs}
            imageUrl={(sheetId) => images.get(sheetId) ?? null}
            entries={entries}
            history={<HistoryPanel jobId={job.id} />}
            questions={questions}
            here={here}
          />
        </EditorContext>
      );
  }
}
