import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '../../components/button';
import { MenuItem, MoreMenu } from '../../components/more-menu';
import { Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { Table } from '../../components/table';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { formatDay } from '../../lib/format';
import { moneyOf } from '../../lib/money';
import { type Due, type JobPayments, type Payment, paymentsQuery, useRequestDue } from './api';
import styles from './payments.module.css';
import { RecordDialog } from './record-form';
import { RefundDialog } from './refund-form';
import { documentWord, dueStanding, methodWord, paymentStanding, refundable, refundStanding } from './words';

interface PaymentsProps {
  readonly jobId: string;
  readonly editable: boolean;
  /** Owners pay back. */
  readonly mayRefund: boolean;
}

/** What is owed, what came in, and the papers of both. */
export function PaymentsSection({ jobId, editable, mayRefund }: PaymentsProps) {
  const payments = useQuery(paymentsQuery(jobId));
  if (payments.isPending)
    return (
      <Section title="Payments">
        <SkeletonRows rows={3} label="Loading the payments" />
      </Section>
    );
  if (payments.isError)
    return (
      <Section title="Payments">
        <Problem error={payments.error} onRetry={() => payments.refetch()} />
      </Section>
    );
  if (payments.data.dues.length === 0) return null;
  return <Payments jobId={jobId} data={payments.data} editable={editable} mayRefund={mayRefund} />;
}

type Asked = { readonly record: Due } | { readonly refund: Payment };

function Payments({ jobId, data, editable, mayRefund }: PaymentsProps & { readonly data: JobPayments }) {
  const [asked, setAsked] = useState<Asked | null>(null);
  const request = useRequestDue(jobId);
  const money = moneyOf(data);
  const ask = (due: Due) =>
    request.mutate(due.id, {
      onSuccess: () => showToast({ message: `${due.name} is asked for, with an invoice by mail.` }),
      onError: (error) => void showProblem(sentenceOf(error)),
    });
  const close = () => setAsked(null);
  return (
    <Section
      title="Payments"
      lede={`Agreed ${money(data.agreedMinor)}, paid ${money(data.paidMinor)}, still to pay ${money(data.outstandingMinor)}.`}
    >
      {data.creditMinor > 0 && (
        <p className={styles.credit}>
          {money(data.creditMinor)} is to go back to the client: change orders took off more than was still to
          pay.
          {mayRefund && ' Pay it back from one of the payments below.'}
        </p>
      )}
      <Table label="What is owed">
        <thead>
          <tr>
            <th scope="col">Stage</th>
            <th scope="col" className={styles.wide} data-align="end">
              Agreed
            </th>
            <th scope="col" data-align="end">
              Still to pay
            </th>
            <th scope="col">
              <span className="visually-hidden">What to do</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {data.dues.map((due) => (
            <tr key={due.id}>
              <td>
                <strong>{due.name}</strong>
                <div className={styles.below}>{dueStanding(due)}</div>
              </td>
              <td className={styles.wide} data-align="end">
                {money(due.amountMinor - due.reducedMinor)}
                {due.reducedMinor > 0 && (
                  <div className={styles.below}>
                    {money(due.amountMinor)} less {money(due.reducedMinor)} by change order
                  </div>
                )}
              </td>
              <td data-align="end">{due.outstandingMinor === 0 ? '–' : money(due.outstandingMinor)}</td>
              <td data-align="end">
                {editable && due.outstandingMinor > 0 && (
                  <span className={styles.actions}>
                    {due.requestedAt === null && (
                      <Button
                        busy={request.isPending && request.variables === due.id}
                        aria-label={`Ask for it: ${due.name}`}
                        onClick={() => ask(due)}
                      >
                        Ask for it
                      </Button>
                    )}
                    <Button
                      aria-label={`Record a payment for: ${due.name}`}
                      onClick={() => setAsked({ record: due })}
                    >
                      Record…
                    </Button>
                  </span>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </Table>
      {data.payments.length > 0 && (
        <>
          <h3 className={styles.sub}>Came in</h3>
          <Received data={data} mayRefund={mayRefund} onRefund={(payment) => setAsked({ refund: payment })} />
        </>
      )}
      {data.documents.length > 0 && (
        <>
          <h3 className={styles.sub}>Papers</h3>
          <ul className={styles.papers}>
            {data.documents.map((paper) => {
              const called = `${documentWord(paper.kind)} ${paper.number}`;
              return (
                <li key={paper.id}>
                  {paper.pdfUrl === null ? (
                    <span>
                      {called} <span className="quiet">is being made…</span>
                    </span>
                  ) : (
                    <a href={paper.pdfUrl} target="_blank" rel="noreferrer">
                      {called}
                      <span className="visually-hidden"> (opens in a new tab)</span>
                    </a>
                  )}
                  <span className="quiet">
                    {formatDay(paper.createdAt)}
                    {paper.mailedAt !== null && ', mailed'}
                  </span>
                  <span className="figure">{money(paper.amountMinor)}</span>
                </li>
              );
            })}
          </ul>
        </>
      )}
      {asked !== null && 'record' in asked && (
        <RecordDialog jobId={jobId} due={asked.record} manner={data} onClose={close} />
      )}
      {asked !== null && 'refund' in asked && (
        <RefundDialog
          jobId={jobId}
          payment={asked.refund}
          mostMinor={refundable(asked.refund, data.refunds)}
          creditMinor={data.creditMinor}
          manner={data}
          onClose={close}
        />
      )}
    </Section>
  );
}

interface ReceivedProps {
  readonly data: JobPayments;
  readonly mayRefund: boolean;
  readonly onRefund: (payment: Payment) => void;
}

function Received({ data, mayRefund, onRefund }: ReceivedProps) {
  const money = moneyOf(data);
  return (
    <Table label="Payments that came in">
      <thead>
        <tr>
          <th scope="col">Payment</th>
          <th scope="col" className={styles.wide}>
            For
          </th>
          <th scope="col" data-align="end">
            Amount
          </th>
          <th scope="col">
            <span className="visually-hidden">More</span>
          </th>
        </tr>
      </thead>
      <tbody>
        {data.payments.map((payment) => {
          const standing = paymentStanding(payment);
          const refunds = data.refunds.filter(({ paymentId }) => paymentId === payment.id);
          const due = data.dues.find(({ id }) => id === payment.dueId);
          return (
            <tr key={payment.id}>
              <td>
                {methodWord(payment.method)},{' '}
                {formatDay(payment.receivedOn ?? payment.settledAt ?? payment.createdAt)}
                {standing !== null && <div className={styles.below}>{standing}</div>}
                {payment.recordedBy !== '' && (
                  <div className={styles.below}>Recorded by {payment.recordedBy}</div>
                )}
                {payment.note !== '' && <div className={styles.below}>{payment.note}</div>}
                {refunds.map((refund) => (
                  <div key={refund.id} className={styles.below}>
                    {refundStanding(refund)}: {money(refund.amountMinor)}, {refund.reason}
                  </div>
                ))}
              </td>
              <td className={styles.wide}>{due?.name ?? ''}</td>
              <td data-align="end">
                {payment.status === 'succeeded' ? (
                  money(payment.amountMinor)
                ) : (
                  <span className="quiet">{money(payment.amountMinor)}</span>
                )}
                {payment.refundedMinor > 0 && (
                  <div className={styles.below}>{money(-payment.refundedMinor)} paid back</div>
                )}
              </td>
              <td data-align="end">
                {mayRefund && refundable(payment, data.refunds) > 0 && (
                  <MoreMenu label={`More for ${methodWord(payment.method)}, ${money(payment.amountMinor)}`}>
                    <MenuItem onSelect={() => onRefund(payment)}>Pay back…</MenuItem>
                  </MoreMenu>
                )}
              </td>
            </tr>
          );
        })}
      </tbody>
    </Table>
  );
}
