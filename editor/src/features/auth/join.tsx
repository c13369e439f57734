import { z } from 'zod';
import { Button } from '../../components/button';
import { Form, PasswordField, TextField, useZodForm } from '../../components/form';
import { Problem } from '../../components/states';
import type { Me } from '../../lib/me';
import { useSignOut } from '../../lib/session';
import { type InvitationLook, joinSchema, useAcceptInvitation } from './api';

interface JoinProps {
  readonly token: string;
  readonly invitation: InvitationLook;
  readonly onDone: () => void;
}

/**
 * Accepts an invitation: with one press for whoever is signed in with its address, with the password for
 * somebody who has an account, else with a name and a new password.
 */
export function Join({ me, ...props }: JoinProps & { readonly me: Me | null }) {
  if (me && me.user.email.toLowerCase() !== props.invitation.email.toLowerCase())
    return <OtherAccount email={props.invitation.email} signedInAs={me.user.email} />;
  if (me) return <JoinSignedIn {...props} />;
  return props.invitation.hasAccount ? <JoinKnown {...props} /> : <JoinNew {...props} />;
}

function OtherAccount({ email, signedInAs }: { email: string; signedInAs: string }) {
  const signOut = useSignOut();
  return (
    <div style={{ display: 'grid', gap: 16 }}>
      <Problem
        error={`You are signed in as ${signedInAs}. Sign out first; then the invitation for ${email} can be accepted here.`}
      />
      {signOut.isError && <Problem error={signOut.error} />}
      <Button kind="strong" size="large" wide busy={signOut.isPending} onClick={() => signOut.mutate()}>
        Sign out
      </Button>
    </div>
  );
}

function JoinSignedIn({ token, invitation, onDone }: JoinProps) {
  const accept = useAcceptInvitation();
  return (
    <div style={{ display: 'grid', gap: 16 }}>
      {accept.isError && <Problem error={accept.error} />}
      <Button
        kind="lamp"
        size="large"
        wide
        busy={accept.isPending}
        onClick={() => accept.mutate({ token }, { onSuccess: onDone })}
      >
        Join {invitation.companyName}
      </Button>
    </div>
  );
}

const knownSchema = z.object({ password: z.string().min(1) });

function JoinKnown({ token, invitation, onDone }: JoinProps) {
  const accept = useAcceptInvitation();
  const form = useZodForm(knownSchema, { defaultValues: { password: '' } });
  return (
    <Form
      form={form}
      label="Join"
      submitLabel={`Join ${invitation.companyName}`}
      submitKind="lamp"
      wideButton
      onSubmit={async ({ password }) => {
        await accept.mutateAsync({ token, password });
        onDone();
      }}
    >
      <PasswordField
        control={form.control}
        name="password"
        label="Password"
        hint="Of the account that this address has already."
        autoComplete="current-password"
      />
    </Form>
  );
}

function JoinNew({ token, invitation, onDone }: JoinProps) {
  const accept = useAcceptInvitation();
  const form = useZodForm(joinSchema, { defaultValues: { name: '', password: '' } });
  return (
    <Form
      form={form}
      label="Join"
      submitLabel={`Join ${invitation.companyName}`}
      submitKind="lamp"
      wideButton
      onSubmit={async (values) => {
        await accept.mutateAsync({ token, ...values });
        onDone();
      }}
    >
      <TextField control={form.control} name="name" label="Your name" autoComplete="name" />
      <PasswordField
        control={form.control}
        name="password"
        label="Choose a password"
        hint="At least 10 characters."
        autoComplete="new-password"
      />
    </Form>
  );
}
