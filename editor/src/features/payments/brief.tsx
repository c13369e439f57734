import { useQuery } from '@tanstack/react-query';
import { Problem } from '../../components/states';
import { moneyOf } from '../../lib/money';
import { paymentsQuery } from './api';
import styles from './payments.module.css';
import { dueStanding, nextDue } from './words';

/** What is owed next, as a row of the job's page. */
export function PaymentsBrief({ jobId }: { readonly jobId: string }) {
  const payments = useQuery(paymentsQuery(jobId));
  const { data } = payments;
  if (payments.isError && data === undefined)
    return (
      <li>
        <Problem error={payments.error} onRetry={() => payments.refetch()} />
      </li>
    );
  if (data === undefined || data.dues.length === 0) return null;
  const money = moneyOf(data);
  const next = nextDue(data);
  return (
    <li>
      <div>
        <strong>
          {next === undefined
            ? `All of ${money(data.agreedMinor)} is paid`
            : `${next.name}: ${money(next.outstandingMinor)}`}
        </strong>
        {next !== undefined && (
          <p className={styles.below}>
            {dueStanding(next)}. {money(data.paidMinor)} of {money(data.agreedMinor)} is paid.
          </p>
        )}
        {data.creditMinor > 0 && (
          <p className={styles.below}>{money(data.creditMinor)} is to go back to the client.</p>
        )}
      </div>
    </li>
  );
}
