import { Link, useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { LinkButton } from '../../components/button';
import { Problem } from '../../components/states';
import { showToast } from '../../components/toast';
import { Front } from '../../features/auth/front';
import { ResetPasswordForm } from '../../features/auth/reset-password-form';
import { useLinkToken } from '../../lib/link-token';

export default function ResetPasswordScreen() {
  const token = useLinkToken();
  const navigate = useNavigate();
  return (
    <Front
      title="Choose a new password"
      lede="Every device that is signed in to your account is signed out."
      foot={
        <span>
          <Link to={paths.signIn}>Back to sign in</Link>
        </span>
      }
    >
      {token === '' ? (
        <>
          <Problem error="This link is not complete. Open it from the mail again, or ask for a new one." />
          <p style={{ marginBlockStart: 16 }}>
            <LinkButton to={paths.forgotPassword}>Ask for a new link</LinkButton>
          </p>
        </>
      ) : (
        <ResetPasswordForm
          token={token}
          onDone={() => {
            showToast({ message: 'The password is set. Sign in with it.' });
            navigate(paths.signIn, { replace: true });
          }}
        />
      )}
    </Front>
  );
}
