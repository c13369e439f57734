import { useState } from 'react';
import { Link } from 'react-router-dom';
import { z } from 'zod';
import { Button } from '../../components/button';
import { AreaField, Form, useZodForm } from '../../components/form';
import { Section } from '../../components/page';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { formatMoment } from '../../lib/format';
import { type OpenFault, useAcceptFault, useWithdrawAcceptance } from './api';
import styles from './faults.module.css';

interface FaultsPartProps {
  readonly jobId: string;
  readonly faults: readonly OpenFault[];
  readonly editable: boolean;
  readonly planHref: (recordIds: readonly string[]) => string;
}

/** Faults of the plan: each is mended on the plan, or somebody answers for it in writing. */
export function FaultsPart({ jobId, faults, editable, planHref }: FaultsPartProps) {
  const open = faults.filter(({ acceptance }) => acceptance === null);
  const accepted = faults.filter(({ acceptance }) => acceptance !== null);
  return (
    <>
      <Section
        title="Open faults"
        lede={
          open.length === 0
            ? undefined
            : 'A proposal waits until each is mended on the plan, or accepted in writing by somebody who answers for it.'
        }
      >
        {open.length === 0 && (
          <p className={styles.none}>
            {faults.length === 0 ? 'The plan has no faults.' : 'None that nobody answers for.'}
          </p>
        )}
        <ul className={styles.list}>
          {open.map((fault) => (
            <Open key={fault.key} jobId={jobId} fault={fault} editable={editable} planHref={planHref} />
          ))}
        </ul>
      </Section>
      {accepted.length > 0 && (
        <Section title="Accepted">
          <ul className={styles.list}>
            {accepted.map((fault) => (
              <Accepted key={fault.key} jobId={jobId} fault={fault} editable={editable} planHref={planHref} />
            ))}
          </ul>
        </Section>
      )}
    </>
  );
}

interface FaultProps extends Omit<FaultsPartProps, 'faults'> {
  readonly fault: OpenFault;
}

const reasonSchema = z.object({
  reason: z.string().trim().min(3, { error: 'Please say why this fault is acceptable.' }).max(1000),
});

function Open({ jobId, fault, editable, planHref }: FaultProps) {
  const [writing, setWriting] = useState(false);
  const accept = useAcceptFault(jobId);
  const form = useZodForm(reasonSchema, { defaultValues: { reason: '' } });
  return (
    <li className={styles.fault} data-open="">
      <p className={styles.message}>{fault.message}</p>
      {!writing && (
        <div className={styles.actions}>
          <Link to={planHref([fault.recordId])}>Open on the plan</Link>
          {editable && (
            <Button aria-label={`Accept in writing: ${fault.message}`} onClick={() => setWriting(true)}>
              Accept in writing
            </Button>
          )}
        </div>
      )}
      {writing && (
        <Form
          form={form}
          label={`Accept: ${fault.message}`}
          submitLabel="Accept the fault"
          beside={
            <Button kind="bare" onClick={() => setWriting(false)}>
              Leave it open
            </Button>
          }
          onSubmit={async ({ reason }) => {
            await accept.mutateAsync({ faultKey: fault.key, message: fault.message, reason });
          }}
        >
          <AreaField
            control={form.control}
            name="reason"
            label="Why is it acceptable?"
            hint="Your name and the time are kept with it."
            rows={2}
          />
        </Form>
      )}
    </li>
  );
}

function Accepted({ jobId, fault, editable, planHref }: FaultProps) {
  const withdraw = useWithdrawAcceptance(jobId);
  const accept = useAcceptFault(jobId);
  const { acceptance } = fault;
  if (acceptance === null) return null;
  const again = () =>
    accept.mutateAsync({ faultKey: fault.key, message: fault.message, reason: acceptance.reason });
  return (
    <li className={styles.fault}>
      <p className={styles.message}>{fault.message}</p>
      <p className={styles.reason}>
        “{acceptance.reason}”
        <span className={styles.who}>
          {acceptance.by}, {formatMoment(acceptance.at)}
        </span>
      </p>
      <div className={styles.actions}>
        <Link to={planHref([fault.recordId])}>Open on the plan</Link>
        {editable && (
          <Button
            busy={withdraw.isPending}
            aria-label={`Withdraw: ${fault.message}`}
            onClick={() =>
              withdraw.mutate(acceptance.id, {
                onSuccess: () => void showToast({ message: 'The fault is open again.', undo: again }),
                onError: (error) => void showProblem(sentenceOf(error)),
              })
            }
          >
            Withdraw
          </Button>
        )}
      </div>
    </li>
  );
}
