import { useQuery } from '@tanstack/react-query';
import { Section } from '../../components/page';
import { formatMoment } from '../../lib/format';
import { moneyOf } from '../../lib/money';
import { type Proposal, type Revision, revisionQuery } from './api';
import { FileLink } from './file-link';
import styles from './proposal.module.css';
import { groupNames } from './sums';

interface ApprovalProps {
  readonly jobId: string;
  readonly proposal: Proposal;
  readonly revision: Revision;
}

/** The yes and its evidence. */
export function ApprovalSection({ jobId, proposal, revision }: ApprovalProps) {
  const detail = useQuery(revisionQuery(jobId, revision.id));
  const money = moneyOf(proposal);
  const { approval } = revision;
  if (approval === null) return null;
  const names = detail.data === undefined ? null : groupNames(detail.data.document, approval.groups);
  return (
    <Section
      title={revision.changeOrder ? 'Approval of the change order' : 'Approval'}
      actions={
        approval.signedPdfUrl === null ? (
          <span className="quiet" role="status">
            The signed PDF is being made…
          </span>
        ) : (
          <FileLink href={approval.signedPdfUrl}>Open the signed PDF</FileLink>
        )
      }
    >
      <dl className={styles.facts}>
        <div>
          <dt>Signed by</dt>
          <dd>{approval.typedName}</dd>
        </div>
        <div>
          <dt>On</dt>
          <dd>
            <time dateTime={approval.at}>{formatMoment(approval.at)}</time>
          </dd>
        </div>
        <div>
          <dt>Revision</dt>
          <dd>
            {revision.revision}
            <span className={styles.hash} title={revision.hash}>
              fingerprint {revision.hash.slice(0, 12)}…
            </span>
          </dd>
        </div>
        <div>
          <dt>Add-ons taken</dt>
          <dd>{names === null ? '…' : names.length === 0 ? 'None' : names.join(', ')}</dd>
        </div>
        <div>
          <dt>Total</dt>
          <dd>
            <strong>{money(approval.totalMinor)}</strong>
          </dd>
        </div>
      </dl>
    </Section>
  );
}
