import { Link, Navigate, useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Front } from '../../features/auth/front';
import { SignUpForm } from '../../features/auth/sign-up-form';
import { useMaybeMe } from '../../lib/me';

export default function SignUpScreen() {
  const navigate = useNavigate();
  const me = useMaybeMe();
  if (me.data) return <Navigate to={paths.jobs} replace />;
  return (
    <Front
      title="Create a company"
      lede="You are its owner. Designers and crew are invited afterwards."
      foot={
        <span>
          Already have an account? <Link to={paths.signIn}>Sign in</Link>
        </span>
      }
    >
      <SignUpForm onDone={() => navigate(paths.jobs, { replace: true })} />
    </Front>
  );
}
