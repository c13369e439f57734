import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useParams } from 'react-router-dom';
import { paths, to } from '../../app/paths';
import { Button, LinkButton } from '../../components/button';
import { MenuItem, MoreMenu } from '../../components/more-menu';
import { Page, Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { showProblem, showToast } from '../../components/toast';
import { useArchiveJob, useRestoreJob } from '../../features/jobs/api';
import { EditJob } from '../../features/jobs/edit-job';
import { JobFacts } from '../../features/jobs/job-facts';
import styles from '../../features/jobs/job-page.module.css';
import { StageSteps } from '../../features/jobs/stage-steps';
import { PaymentsBrief } from '../../features/payments/brief';
import { ProposalBrief } from '../../features/proposal/brief';
import { SheetsSection } from '../../features/sheets/sheets-section';
import { SiteWalkSummary } from '../../features/site-walk/summary';
import { TimelineSection } from '../../features/timeline';
import { openQuestions, questionsQuery } from '../../lib/affairs';
import { sentenceOf } from '../../lib/api/client';
import { formatDay } from '../../lib/format';
import { type Job, jobQuery } from '../../lib/jobs';
import { useAbilities, useMe } from '../../lib/me';
import { stages } from '../../lib/stages';

const back = { to: paths.jobs, label: 'Jobs' };

export default function JobScreen() {
  const { jobId = '' } = useParams();
  const job = useQuery(jobQuery(jobId));
  if (job.isPending)
    return (
      <Page title="Job" back={back}>
        <SkeletonRows rows={6} label="Loading the job" />
      </Page>
    );
  if (job.isError)
    return (
      <Page title="Job" back={back}>
        <Problem error={job.error} onRetry={() => job.refetch()} />
      </Page>
    );
  return <JobPage job={job.data} />;
}

function JobPage({ job }: { job: Job }) {
  const abilities = useAbilities();
  const me = useMe();
  const [editing, setEditing] = useState(false);
  const archive = useArchiveJob(job.id);
  const restore = useRestoreJob(job.id);
  const archived = job.archivedAt !== null;
  const editable = abilities.editJobs && !archived;
  const drawable = job.sheets.some((sheet) => sheet.status === 'ready');
  const questions = useQuery({ ...questionsQuery(job.id), enabled: abilities.sell });
  // Once the plan is proven, the proposal is what moves the job on.
  const proposing = abilities.sell && stages.indexOf(job.stage) >= stages.indexOf('propose');
  const complain = (error: unknown) => void showProblem(sentenceOf(error));

  const putAway = () =>
    archive.mutate(undefined, {
      onSuccess: () =>
        showToast({ message: `${job.name} is archived.`, undo: () => restore.mutateAsync(undefined) }),
      onError: complain,
    });

  return (
    <Page
      title={job.name}
      lede={[job.client.name, job.property.address || job.property.name].join(' · ')}
      back={back}
      actions={
        <>
          {editable && (
            <MoreMenu label={`More for ${job.name}`}>
              <MenuItem onSelect={() => setEditing(true)}>Edit the details</MenuItem>
              <MenuItem onSelect={putAway}>Archive the job</MenuItem>
            </MoreMenu>
          )}
          {!abilities.editPrices && <LinkButton to={to.price(job.id)}>Materials</LinkButton>}
          <LinkButton to={to.plan(job.id)} kind={drawable && !proposing ? 'lamp' : 'quiet'}>
            Open the plan
          </LinkButton>
        </>
      }
    >
      {archived && job.archivedAt && (
        <div className={styles.archived}>
          <span>Archived on {formatDay(job.archivedAt)}. It can be looked at, not changed.</span>
          {abilities.editJobs && (
            <Button busy={restore.isPending} onClick={() => restore.mutate(undefined, { onError: complain })}>
              Restore
            </Button>
          )}
        </div>
      )}
      <div className={styles.columns}>
        <div className={styles.sheets}>
          <SheetsSection
            jobId={job.id}
            initial={job.sheets}
            editable={editable}
            planHref={(sheetId) => to.plan(job.id, sheetId)}
          />
        </div>
        <div className={styles.rest}>
          {abilities.sell && (
            <ProposalBrief
              jobId={job.id}
              openQuestions={openQuestions(questions.data ?? []).length}
              priceLink={<LinkButton to={to.price(job.id)}>Price</LinkButton>}
              proposalLink={
                <LinkButton to={to.proposal(job.id)} kind={proposing ? 'lamp' : 'quiet'}>
                  Proposal
                </LinkButton>
              }
              payments={<PaymentsBrief jobId={job.id} />}
            />
          )}
          <Section
            title="Site walk"
            actions={
              !archived && (
                <LinkButton to={to.siteWalk(job.id)}>
                  {job.siteWalk ? 'Edit the site walk' : 'Fill in the site walk'}
                </LinkButton>
              )
            }
            lede={
              job.siteWalk
                ? undefined
                : 'Line volts, outlet, what is in the ground: whoever is on site fills it in.'
            }
          >
            {job.siteWalk && (
              <SiteWalkSummary walk={job.siteWalk} device={me.company?.words.protectiveDevice ?? 'GFCI'} />
            )}
          </Section>
          <Section
            title="Notes"
            actions={editable && <Button onClick={() => setEditing(true)}>Edit the details</Button>}
            lede={job.notes === '' ? 'Nothing noted.' : undefined}
          >
            {job.notes !== '' && <p className={styles.prose}>{job.notes}</p>}
          </Section>
          <TimelineSection jobId={job.id} />
        </div>
        <aside className={styles.aside} aria-label="The job at a glance">
          <StageSteps job={job} editable={editable} />
          <JobFacts job={job} clientHref={to.client(job.client.id)} />
        </aside>
      </div>
      {editable && <EditJob job={job} open={editing} onOpenChange={setEditing} />}
    </Page>
  );
}
