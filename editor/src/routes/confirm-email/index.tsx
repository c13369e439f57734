import { paths } from '../../app/paths';
import { Button, LinkButton } from '../../components/button';
import { Note, Problem } from '../../components/states';
import { useConfirmEmail } from '../../features/auth/api';
import { Front } from '../../features/auth/front';
import { useLinkToken } from '../../lib/link-token';

export default function ConfirmEmailScreen() {
  const token = useLinkToken();
  const confirm = useConfirmEmail();
  if (confirm.isSuccess)
    return (
      <Front title="E-mail address confirmed">
        <Note>From now on you sign in with the new address.</Note>
        <p style={{ marginBlockStart: 20 }}>
          <LinkButton to={paths.jobs} kind="strong">
            Go on
          </LinkButton>
        </p>
      </Front>
    );
  return (
    <Front
      title="Confirm your e-mail address"
      lede="Mail programs open links by themselves, so we ask for one press."
    >
      {token === '' ? (
        <Problem error="This link is not complete. Open it from the mail again." />
      ) : (
        <div style={{ display: 'grid', gap: 16 }}>
          {confirm.isError && <Problem error={confirm.error} />}
          <Button
            kind="strong"
            size="large"
            wide
            busy={confirm.isPending}
            onClick={() => confirm.mutate(token)}
          >
            Confirm the address
          </Button>
        </div>
      )}
    </Front>
  );
}
