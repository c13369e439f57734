import { useState } from 'react';
import { Confirm } from '../../components/confirm';
import { MenuItem, MoreMenu } from '../../components/more-menu';
import { Section } from '../../components/page';
import { Table } from '../../components/table';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { formatMoment } from '../../lib/format';
import { type ProposalLink, useResendLink, useRevokeLink } from './api';
import { remindersOf, sentenceOfLink, standingOf } from './links';
import styles from './proposal.module.css';

interface LinksProps {
  readonly jobId: string;
  readonly links: readonly ProposalLink[];
}

/** Who has a way in, whether they were there, and how to close it. */
export function LinksSection({ jobId, links }: LinksProps) {
  const [revoking, setRevoking] = useState<ProposalLink | null>(null);
  const resend = useResendLink(jobId);
  const revoke = useRevokeLink(jobId);
  const now = new Date().toISOString();
  const close = () => {
    setRevoking(null);
    revoke.reset();
  };
  return (
    <Section title="Links" lede="Whoever has a link can see the proposal, ask, and approve it.">
      <Table label="Links">
        <thead>
          <tr>
            <th scope="col">To</th>
            <th scope="col" className={styles.wide}>
              Seen
            </th>
            <th scope="col" className={styles.wide}>
              Sent
            </th>
            <th scope="col">
              <span className="visually-hidden">More</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {links.map((link) => {
            const works = standingOf(link, now) === 'works';
            const called = link.name === '' ? link.email : link.name;
            return (
              <tr key={link.id}>
                <td>
                  <strong className={styles.called}>{called}</strong>
                  {link.name !== '' && <div className={styles.below}>{link.email}</div>}
                  <div className={styles.phoneOnly}>
                    {sentenceOfLink(link, now)}, {remindersOf(link)}
                  </div>
                </td>
                <td className={styles.wide}>{sentenceOfLink(link, now)}</td>
                <td className={styles.wide}>
                  {formatMoment(link.createdAt)}
                  <div className={styles.below}>{remindersOf(link)}</div>
                </td>
                <td data-align="end">
                  {works && (
                    <MoreMenu label={`More for the link of ${called}`}>
                      <MenuItem
                        onSelect={() =>
                          resend.mutate(link.id, {
                            onSuccess: () => showToast({ message: `Sent to ${called} again.` }),
                            onError: (error) => void showProblem(sentenceOf(error)),
                          })
                        }
                      >
                        Send it again
                      </MenuItem>
                      <MenuItem onSelect={() => setRevoking(link)}>Revoke the link…</MenuItem>
                    </MoreMenu>
                  )}
                </td>
              </tr>
            );
          })}
        </tbody>
      </Table>
      <Confirm
        open={revoking !== null}
        onOpenChange={(open) => !open && close()}
        title={`Revoke the link of ${revoking?.name || revoking?.email || ''}?`}
        doLabel="Revoke it"
        busy={revoke.isPending}
        error={revoke.error}
        onConfirm={() =>
          revoking &&
          revoke.mutate(revoking.id, {
            onSuccess: () => {
              showToast({ message: 'The link is revoked.' });
              close();
            },
          })
        }
      >
        It stops working at once, also for everybody it was forwarded to. This can’t be taken back: to let
        them in again, send the proposal anew, with a new link.
      </Confirm>
    </Section>
  );
}
