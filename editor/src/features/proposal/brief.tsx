import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { count } from '../../lib/format';
import { moneyOf } from '../../lib/money';
import { proposalWord } from '../../lib/proposal-states';
import { priceBriefQuery, proposalQuery } from './api';
import styles from './proposal.module.css';
import { sentenceOfState } from './standing';

interface BriefProps {
  readonly jobId: string;
  readonly openQuestions: number;
  readonly priceLink: ReactNode;
  readonly proposalLink: ReactNode;
  /** What is owed, once something was agreed. */
  readonly payments: ReactNode;
}

/** Price and proposal on the job's page: how they stand, and the ways to them. */
export function ProposalBrief({ jobId, openQuestions, priceLink, proposalLink, payments }: BriefProps) {
  const price = useQuery(priceBriefQuery(jobId));
  const proposal = useQuery(proposalQuery(jobId));
  const { data } = proposal;
  return (
    <Section title="Price and proposal">
      <ul className={styles.brief}>
        <li>
          <div>
            {price.isPending && <SkeletonRows rows={1} label="Loading the price" />}
            {price.isError && <Problem error={price.error} onRetry={() => price.refetch()} />}
            {price.data !== undefined && (
              <>
                <strong>
                  {price.data.totalMinor === null
                    ? 'Nothing to price yet'
                    : moneyOf(price.data)(price.data.totalMinor)}
                </strong>
                <p className={styles.below}>
                  {price.data.obstacles.length === 0
                    ? 'As the plan is now; nothing stands in the way of a proposal.'
                    : `As the plan is now; ${count(price.data.obstacles.length, 'thing')} before a proposal.`}
                </p>
              </>
            )}
          </div>
          {priceLink}
        </li>
        <li>
          <div>
            {proposal.isPending && <SkeletonRows rows={1} label="Loading the proposal" />}
            {proposal.isError && <Problem error={proposal.error} onRetry={() => proposal.refetch()} />}
            {data !== undefined && (
              <>
                <div className={styles.briefHead}>
                  <strong>
                    Proposal{data.number === null ? '' : ` ${data.number}`}:{' '}
                    {proposalWord(data.state).toLowerCase()}
                  </strong>
                  {openQuestions > 0 && (
                    <span className={styles.badge}>{count(openQuestions, 'open question')}</span>
                  )}
                </div>
                <p className={styles.below}>{sentenceOfState(data, new Date().toISOString())}</p>
                {data.stale && data.revisions[0] !== undefined && (
                  <p className={styles.below}>
                    The plan or the price has changed since revision {data.revisions[0].revision}.
                  </p>
                )}
              </>
            )}
          </div>
          {proposalLink}
        </li>
        {data?.revisions.some(({ approval }) => approval !== null) && payments}
      </ul>
    </Section>
  );
}
