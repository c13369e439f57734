import { Button } from '../../components/button';
import { Form, PasswordField, TextField, useZodForm } from '../../components/form';
import { Problem } from '../../components/states';
import { type InvitationLook, joinSchema, useAcceptInvitation } from './api';

interface JoinProps {
  readonly token: string;
  readonly invitation: InvitationLook;
  readonly onDone: () => void;
}

/** Accepts an invitation: with one press for somebody who has an account, else with a name and password. */
export function Join({ token, invitation, onDone }: JoinProps) {
  return invitation.hasAccount ? (
    <JoinKnown token={token} invitation={invitation} onDone={onDone} />
  ) : (
    <JoinNew token={token} invitation={invitation} onDone={onDone} />
  );
}

function JoinKnown({ token, invitation, onDone }: JoinProps) {
  const accept = useAcceptInvitation();
  return (
    <>
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
    </>
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
