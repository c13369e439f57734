import { useState } from 'react';
import { Confirm } from '../../components/confirm';
import { MenuItem, MoreMenu } from '../../components/more-menu';
import { Section } from '../../components/page';
import { Table } from '../../components/table';
import { showToast } from '../../components/toast';
import { formatMoment } from '../../lib/format';
import { moneyOf } from '../../lib/money';
import { proposalWord } from '../../lib/proposal-states';
import { type Proposal, type Revision, useReleaseRevision, useWithdrawRevision } from './api';
import { FileLink } from './file-link';
import styles from './proposal.module.css';

interface RevisionsProps {
  readonly jobId: string;
  readonly proposal: Proposal;
}

const canWithdraw = ({ state }: Revision) => ['sent', 'opened', 'commented', 'ready'].includes(state);
const canRelease = ({ state, releasedAt }: Revision) =>
  releasedAt === null && state !== 'preparing' && state !== 'withdrawn' && state !== 'declined';

/** Every revision there was, newest first, with what can still be done with it. */
export function RevisionsSection({ jobId, proposal }: RevisionsProps) {
  const [asked, setAsked] = useState<{ readonly what: 'withdraw' | 'release'; readonly of: Revision } | null>(
    null,
  );
  const withdraw = useWithdrawRevision(jobId);
  const release = useReleaseRevision(jobId);
  const money = moneyOf(proposal);
  const close = () => {
    setAsked(null);
    withdraw.reset();
    release.reset();
  };
  return (
    <Section title="Revisions" lede="Each is kept as it was made: plan, price and words.">
      <Table label="Revisions">
        <thead>
          <tr>
            <th scope="col">Revision</th>
            <th scope="col" className={styles.wide}>
              How it stands
            </th>
            <th scope="col" data-align="end">
              Total
            </th>
            <th scope="col">Paper</th>
            <th scope="col">
              <span className="visually-hidden">More</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {proposal.revisions.map((revision) => (
            <tr key={revision.id}>
              <td>
                <strong>{revision.revision}</strong>
                {revision.changeOrder && <span className="quiet"> · change order</span>}
                <div className={styles.phoneOnly}>
                  <Standing revision={revision} />
                </div>
                <div className={styles.below}>
                  {formatMoment(revision.createdAt)}, {revision.createdBy}
                </div>
              </td>
              <td className={styles.wide}>
                <Standing revision={revision} />
              </td>
              {/* What was agreed, of the parts taken; before that, what is offered. */}
              <td data-align="end">{money(revision.approval?.totalMinor ?? revision.totalMinor)}</td>
              <td>
                <span className={styles.papers}>
                  {revision.pdfUrl !== null && <FileLink href={revision.pdfUrl}>PDF</FileLink>}
                  {revision.approval?.signedPdfUrl && (
                    <FileLink href={revision.approval.signedPdfUrl}>Signed PDF</FileLink>
                  )}
                </span>
              </td>
              <td data-align="end">
                {(canWithdraw(revision) || canRelease(revision)) && (
                  <MoreMenu label={`More for revision ${revision.revision}`}>
                    {canRelease(revision) && (
                      <MenuItem onSelect={() => setAsked({ what: 'release', of: revision })}>
                        Release to the crew…
                      </MenuItem>
                    )}
                    {canWithdraw(revision) && (
                      <MenuItem onSelect={() => setAsked({ what: 'withdraw', of: revision })}>
                        Withdraw…
                      </MenuItem>
                    )}
                  </MoreMenu>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
      <Confirm
        open={asked?.what === 'withdraw'}
        onOpenChange={(open) => !open && close()}
        title={`Withdraw revision ${asked?.of.revision ?? ''}?`}
        doLabel="Withdraw it"
        busy={withdraw.isPending}
        error={withdraw.error}
        onConfirm={() =>
          asked &&
          withdraw.mutate(asked.of.id, {
            onSuccess: () => {
              showToast({ message: `Revision ${asked.of.revision} is withdrawn.` });
              close();
            },
          })
        }
      >
        The client can’t approve it any more. This can’t be taken back: to offer it again, make a new
        revision.
      </Confirm>
      <Confirm
        open={asked?.what === 'release'}
        onOpenChange={(open) => !open && close()}
        title={`Release revision ${asked?.of.revision ?? ''} to the crew?`}
        doLabel="Release it"
        busy={release.isPending}
        error={release.error}
        onConfirm={() =>
          asked &&
          release.mutate(asked.of.id, {
            onSuccess: () => {
              showToast({ message: `The crew may work from revision ${asked.of.revision}.` });
              close();
            },
          })
        }
      >
        The crew may build from it. This can’t be taken back; a later revision can be released in its place.
      </Confirm>
    </Section>
  );
}

const Standing = ({ revision }: { readonly revision: Revision }) => (
  <>
    {proposalWord(revision.state)}
    {revision.failure !== null && <div className={styles.below}>{revision.failure}</div>}
    {revision.releasedAt !== null && (
      <div className={styles.below}>Released to the crew {formatMoment(revision.releasedAt)}</div>
    )}
  </>
);
