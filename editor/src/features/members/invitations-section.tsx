import { useQuery } from '@tanstack/react-query';
import { z } from 'zod';
import { Button } from '../../components/button';
import { ChoiceField, Form, TextField, useZodForm } from '../../components/form';
import { Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { showProblem, showToast } from '../../components/toast';
import { sentenceOf } from '../../lib/api/client';
import { formatDay } from '../../lib/format';
import { roleSchema } from '../../lib/me';
import {
  type Invitation,
  invitationsQuery,
  type NewInvitation,
  useInvite,
  useResendInvitation,
  useRevokeInvitation,
} from './api';
import styles from './members.module.css';
import { roleLabel, roleMeaning, roleOptions } from './roles';

const schema = z.object({ email: z.email().max(254), role: roleSchema });

/** For owners: who is asked to join, and asking more. */
export function InvitationsSection() {
  const invitations = useQuery(invitationsQuery);
  return (
    <>
      <Section title="Invite somebody">
        <div className={styles.invite}>
          <InviteForm />
        </div>
      </Section>
      <Section
        title="Waiting for an answer"
        lede={invitations.data?.length === 0 ? 'Every invitation is answered.' : undefined}
      >
        {invitations.isPending && <SkeletonRows rows={2} label="Loading invitations" />}
        {invitations.isError && <Problem error={invitations.error} onRetry={() => invitations.refetch()} />}
        <ul>
          {invitations.data?.map((invitation) => (
            <InvitationRow key={invitation.id} invitation={invitation} />
          ))}
        </ul>
      </Section>
    </>
  );
}

function InviteForm() {
  const invite = useInvite();
  const start: NewInvitation = { email: '', role: 'designer' };
  const form = useZodForm(schema, { defaultValues: start });
  const role = form.watch('role');
  return (
    <Form
      form={form}
      label="Invite somebody"
      submitLabel="Send the invitation"
      onSubmit={async (values) => {
        await invite.mutateAsync(values);
        showToast({ message: `The invitation to ${values.email} is on its way.` });
        form.reset(start);
      }}
    >
      <TextField control={form.control} name="email" label="E-mail" type="email" autoComplete="off" />
      <ChoiceField
        control={form.control}
        name="role"
        label="Role"
        hint={roleMeaning(role)}
        options={roleOptions}
      />
    </Form>
  );
}

function InvitationRow({ invitation }: { invitation: Invitation }) {
  const resend = useResendInvitation();
  const revoke = useRevokeInvitation();
  const invite = useInvite();
  const { email, role } = invitation;
  const complain = (error: unknown) => void showProblem(sentenceOf(error));
  return (
    <li className={styles.invitation}>
      <div>
        <strong className={styles.name}>{email}</strong>
        <div className={styles.below}>
          {roleLabel(role)} · invited by {invitation.invitedBy} ·{' '}
          {invitation.expired
            ? `ran out on ${formatDay(invitation.expiresAt)}`
            : `good until ${formatDay(invitation.expiresAt)}`}
        </div>
      </div>
      <div className={styles.actions}>
        <Button
          busy={resend.isPending}
          onClick={() =>
            resend.mutate(invitation.id, {
              onSuccess: () => showToast({ message: `Sent to ${email} again, with a new link.` }),
              onError: complain,
            })
          }
        >
          Send again
        </Button>
        <Button
          kind="bare"
          busy={revoke.isPending}
          onClick={() =>
            revoke.mutate(invitation.id, {
              onSuccess: () =>
                showToast({
                  message: `The invitation to ${email} is taken back.`,
                  undoLabel: 'Invite again',
                  undo: () => invite.mutateAsync({ email, role }),
                }),
              onError: complain,
            })
          }
        >
          Take back
        </Button>
      </div>
    </li>
  );
}
