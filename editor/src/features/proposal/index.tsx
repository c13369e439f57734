import { useQuery } from '@tanstack/react-query';
import { type ReactNode, useState } from 'react';
import { Button, LinkButton } from '../../components/button';
import { showProblem } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { count } from '../../lib/format';
import type { Job } from '../../lib/jobs';
import { useMe } from '../../lib/me';
import { type Obstacle, type Proposal, priceBriefQuery, revisionQuery, useMakeRevision } from './api';
import { ApprovalSection } from './approval';
import { LinksSection } from './links-section';
import { Preview } from './preview';
import { RevisionsSection } from './revisions-section';
import { firstMessage, firstRecipients } from './send';
import { SendDialog } from './send-form';
import { changedSince, clearLabel, type Move, makeLabel, moveOf, overtaken } from './standing';
import { Preparing, StandingCard } from './standing-card';
import { sameWords } from './words';
import { WordsSection } from './words-section';

interface ProposalViewProps {
  readonly job: Job;
  readonly proposal: Proposal;
  readonly openQuestions: number;
  /** An archived job is looked at, not changed. */
  readonly editable: boolean;
  /** Where an obstacle is mended. */
  readonly mendAt: (mend: Obstacle['mend']) => string;
  readonly companyWords: ReactNode;
  /** Questions and money, which stand between the paper and the words. */
  readonly children: ReactNode;
  /** The id of the part with the questions. */
  readonly questionsId: string;
}

/** The company's side of a job's proposal. */
export function ProposalView({
  job,
  proposal,
  openQuestions,
  editable,
  mendAt,
  companyWords,
  children,
  questionsId,
}: ProposalViewProps) {
  const newest = proposal.revisions[0];
  const price = useQuery({ ...priceBriefQuery(job.id), enabled: editable });
  const detail = useQuery({ ...revisionQuery(job.id, newest?.id ?? ''), enabled: newest !== undefined });
  const wordsChanged = detail.data !== undefined && !sameWords(detail.data.document.words, proposal.words);
  const changed = overtaken(proposal) ?? changedSince(newest, proposal.stale, wordsChanged);
  const move: Move = editable
    ? moveOf(proposal, {
        obstacles: price.data?.obstacles ?? [],
        openQuestions,
        changed: changed !== null,
      })
    : { kind: 'none' };
  const approved = proposal.revisions.filter(({ approval }) => approval !== null);
  return (
    <>
      <StandingCard
        proposal={proposal}
        changed={changed}
        obstacles={move.kind === 'clear' ? move.obstacles : []}
        mendAt={mendAt}
        move={
          <MoveOn
            job={job}
            proposal={proposal}
            move={move}
            waiting={price.isPending && editable}
            questionsId={questionsId}
            mendAt={mendAt}
          />
        }
      />
      {approved.map((revision) => (
        <ApprovalSection key={revision.id} jobId={job.id} proposal={proposal} revision={revision} />
      ))}
      {children}
      {newest !== undefined && <Preview jobId={job.id} revisionId={newest.id} />}
      {proposal.links.length > 0 && <LinksSection jobId={job.id} links={proposal.links} />}
      {newest !== undefined && <RevisionsSection jobId={job.id} proposal={proposal} />}
      <WordsSection jobId={job.id} proposal={proposal} editable={editable} companyWords={companyWords} />
    </>
  );
}

interface MoveOnProps {
  readonly job: Job;
  readonly proposal: Proposal;
  readonly move: Move;
  /** What stands in the way is not known yet. */
  readonly waiting: boolean;
  readonly mendAt: (mend: Obstacle['mend']) => string;
  readonly questionsId: string;
}

function MoveOn({ job, proposal, move, waiting, questionsId, mendAt }: MoveOnProps) {
  const me = useMe();
  const make = useMakeRevision(job.id);
  const [sending, setSending] = useState(false);
  switch (move.kind) {
    case 'none':
      return null;
    case 'clear':
      return (
        <p>
          <LinkButton kind="lamp" size="large" to={mendAt(move.obstacles[0]?.mend ?? 'lines')}>
            {clearLabel(move.obstacles, (proposal.revisions[0]?.revision ?? 0) + 1)}
          </LinkButton>
        </p>
      );
    case 'wait':
      return <Preparing progress={move.progress} label="The PDF is being made." />;
    case 'answer':
      return (
        <p>
          <Button
            kind="lamp"
            size="large"
            onClick={() => {
              const part = document.getElementById(questionsId);
              part?.scrollIntoView({ block: 'start' });
              part?.querySelector<HTMLElement>('textarea, button')?.focus({ preventScroll: true });
            }}
          >
            Answer {count(move.questions, 'question')}
          </Button>
        </p>
      );
    case 'make':
      return (
        <p>
          <Button
            kind="lamp"
            size="large"
            busy={make.isPending || waiting}
            onClick={() =>
              make.mutate(undefined, { onError: (error) => void showProblem(sentenceOf(error)) })
            }
          >
            {makeLabel(move)}
          </Button>
        </p>
      );
    case 'send': {
      const { revision } = move;
      return (
        <p>
          <Button kind="lamp" size="large" onClick={() => setSending(true)}>
            {revision.changeOrder ? 'Send the change order…' : `Send revision ${revision.revision}…`}
          </Button>
          <SendDialog
            jobId={job.id}
            revision={revision}
            open={sending}
            onOpenChange={setSending}
            first={{
              recipients: firstRecipients(proposal, job.client),
              message: firstMessage({
                revision,
                property: job.property.address || job.property.name,
                clientName: job.client.name,
                sender: me.user.name,
              }),
            }}
          />
        </p>
      );
    }
  }
}
