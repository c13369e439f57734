import { useNavigate, useSearchParams } from 'react-router-dom';
import { paths, to } from '../../app/paths';
import { Page } from '../../components/page';
import { NewJobForm } from '../../features/jobs/new-job-form';
import { useAbilities } from '../../lib/me';
import NotForYou from '../not-for-you';

export default function NewJobScreen() {
  const navigate = useNavigate();
  const [params] = useSearchParams();
  const { editJobs } = useAbilities();
  if (!editJobs) return <NotForYou />;
  return (
    <Page title="New job" back={{ to: paths.jobs, label: 'Jobs' }} narrow>
      <NewJobForm clientId={params.get('client')} onMade={(jobId) => navigate(to.job(jobId))} />
    </Page>
  );
}
