import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { paths, to } from '../../app/paths';
import { Page } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { MaterialsScreen } from '../../features/pricing/materials-screen';
import { PriceScreen } from '../../features/pricing/price-screen';
import { type Job, jobQuery } from '../../lib/jobs';
import { useAbilities, useMe } from '../../lib/me';

export default function JobPriceScreen() {
  const { jobId = '' } = useParams();
  const job = useQuery(jobQuery(jobId));
  if (job.data) return <OfJob key={jobId} job={job.data} />;
  return (
    <Page title="Materials and price" back={{ to: paths.jobs, label: 'Jobs' }}>
      {job.isPending && <SkeletonRows rows={8} label="Loading the job" />}
      {job.isError && <Problem error={job.error} onRetry={() => void job.refetch()} />}
    </Page>
  );
}

/** Those who may not see prices see what to bring instead. */
function OfJob({ job }: { readonly job: Job }) {
  const { user, company } = useMe();
  const { editPrices, editPriceBook } = useAbilities();
  const planHref = (recordIds: readonly string[]) =>
    recordIds.length === 0 ? to.plan(job.id) : to.planLit(job.id, recordIds);
  if (!editPrices || company === null)
    return <MaterialsScreen jobId={job.id} jobName={job.name} jobTo={to.job(job.id)} planHref={planHref} />;
  return (
    <PriceScreen
      owner={{ userId: user.id, companyId: company.id, jobId: job.id }}
      jobName={job.name}
      jobTo={to.job(job.id)}
      proposalTo={to.proposal(job.id)}
      priceBookTo={editPriceBook ? paths.priceBook : null}
      planHref={planHref}
      editable={job.archivedAt === null}
    />
  );
}
