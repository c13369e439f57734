import { useParams } from 'react-router-dom';
import { to } from '../../app/paths';
import { LinkButton } from '../../components/button';
import { Page } from '../../components/page';

export default function PlanScreen() {
  const { jobId = '' } = useParams();
  return (
    <main>
      <Page title="Plan" back={{ to: to.job(jobId), label: 'Job' }}>
        <LinkButton to={to.job(jobId)}>Back to the job</LinkButton>
      </Page>
    </main>
  );
}
