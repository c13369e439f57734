import { useQuery } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import { to } from '../../app/paths';
import { Page } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { showToast } from '../../components/toast';
import { SiteWalkForm } from '../../features/site-walk/site-walk-form';
import { jobQuery } from '../../lib/jobs';

export default function SiteWalkScreen() {
  const { jobId = '' } = useParams();
  const navigate = useNavigate();
  const job = useQuery(jobQuery(jobId));
  const back = { to: to.job(jobId), label: job.data?.name ?? 'Job' };
  return (
    <Page
      title="Site walk"
      tabTitle={job.data ? `Site walk · ${job.data.name}` : 'Site walk'}
      lede="Leave open what nobody has looked at yet. What you type is kept in this browser until you save it."
      back={back}
      narrow
    >
      {job.isPending && <SkeletonRows rows={6} label="Loading the site walk" />}
      {job.isError && <Problem error={job.error} onRetry={() => job.refetch()} />}
      {job.data && (
        <SiteWalkForm
          key={job.data.id}
          job={job.data}
          onSaved={() => {
            showToast({ message: 'The site walk is saved.' });
            navigate(to.job(jobId));
          }}
        />
      )}
    </Page>
  );
}
