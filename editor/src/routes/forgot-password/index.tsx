import { Link } from 'react-router-dom';
import { paths } from '../../app/paths';
import { ForgotPasswordForm } from '../../features/auth/forgot-password-form';
import { Front } from '../../features/auth/front';

export default function ForgotPasswordScreen() {
  return (
    <Front
      title="Forgotten password"
      lede="Write the e-mail address of your account. We send a link to choose a new password."
      foot={
        <span>
          <Link to={paths.signIn}>Back to sign in</Link>
        </span>
      }
    >
      <ForgotPasswordForm />
    </Front>
  );
}
