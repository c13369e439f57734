import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { paths, to } from '../../app/paths';
import { LinkButton } from '../../components/button';
import { Page, Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { PaymentsSection } from '../../features/payments';
import { ProposalView } from '../../features/proposal';
import { type Proposal, proposalQuery, revisionQuery } from '../../features/proposal/api';
import { Threads } from '../../features/questions/threads';
import { questionsQuery, waitingQuestions } from '../../lib/affairs';
import { type Job, jobQuery } from '../../lib/jobs';
import { useAbilities } from '../../lib/me';
import NotForYou from '../not-for-you';

export default function ProposalScreen() {
  const { sell } = useAbilities();
  return sell ? <Loading /> : <NotForYou />;
}

function Loading() {
  const { jobId = '' } = useParams();
  const job = useQuery(jobQuery(jobId));
  const proposal = useQuery(proposalQuery(jobId));
  const back = job.data ? { to: to.job(jobId), label: job.data.name } : { to: paths.jobs, label: 'Jobs' };
  const failed = [job, proposal].find((query) => query.isError && query.data === undefined);
  if (failed !== undefined)
    return (
      <Page title="Proposal" back={back}>
        <Problem error={failed.error} onRetry={() => failed.refetch()} />
      </Page>
    );
  if (job.data === undefined || proposal.data === undefined)
    return (
      <Page title="Proposal" back={back}>
        <SkeletonRows rows={6} label="Loading the proposal" />
      </Page>
    );
  return <ProposalPage job={job.data} proposal={proposal.data} />;
}

const QUESTIONS_ID = 'questions';

function ProposalPage({ job, proposal }: { readonly job: Job; readonly proposal: Proposal }) {
  const { refund } = useAbilities();
  const questions = useQuery(questionsQuery(job.id));
  const newest = proposal.revisions[0];
  const detail = useQuery({ ...revisionQuery(job.id, newest?.id ?? ''), enabled: newest !== undefined });
  const lights = detail.data?.document.lights ?? [];
  const editable = job.archivedAt === null;
  const asked = questions.data ?? [];
  return (
    <Page
      title={proposal.number === null ? 'Proposal' : `Proposal ${proposal.number}`}
      tabTitle={`Proposal · ${job.name}`}
      lede={`${job.client.name} · ${job.property.address || job.property.name}`}
      back={{ to: to.job(job.id), label: job.name }}
      actions={
        <>
          <LinkButton to={to.plan(job.id)}>Plan</LinkButton>
          <LinkButton to={to.price(job.id)}>Price</LinkButton>
        </>
      }
    >
      <ProposalView
        job={job}
        proposal={proposal}
        openQuestions={waitingQuestions(asked).length}
        editable={editable}
        mendAt={(mend) => (mend === 'plan' ? to.plan(job.id) : to.price(job.id, mend))}
        companyWords={<LinkButton to={paths.proposalTexts}>The company’s words</LinkButton>}
        questionsId={QUESTIONS_ID}
      >
        {questions.isError && (
          <Section title="Questions">
            <Problem error={questions.error} onRetry={() => questions.refetch()} />
          </Section>
        )}
        {asked.length > 0 && (
          <div id={QUESTIONS_ID}>
            <Section title="Questions" lede="What you answer goes to the client’s page, and by mail.">
              <Threads
                jobId={job.id}
                questions={asked}
                editable={editable}
                names={{
                  light: (recordId) => {
                    const light = lights.find((each) => each.recordId === recordId);
                    return light === undefined ? null : `${light.tag}, ${light.name}`;
                  },
                  sheet: (sheetId) => job.sheets.find(({ id }) => id === sheetId)?.name ?? null,
                }}
              />
            </Section>
          </div>
        )}
        {approvedOnce(proposal) && <PaymentsSection jobId={job.id} editable={editable} mayRefund={refund} />}
      </ProposalView>
    </Page>
  );
}

/** Nothing is owed before the first yes. */
const approvedOnce = ({ revisions }: Proposal): boolean =>
  revisions.some(({ approval }) => approval !== null);
