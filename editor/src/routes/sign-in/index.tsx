import { Link, Navigate, useNavigate, useSearchParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Front } from '../../features/auth/front';
import { SignInForm } from '../../features/auth/sign-in-form';
import { useMaybeMe } from '../../lib/me';
import { wayBack } from '../../lib/way-back';

export default function SignInScreen() {
  const navigate = useNavigate();
  const [search] = useSearchParams();
  const me = useMaybeMe();
  const back = wayBack(search);
  if (me.data) return <Navigate to={back} replace />;
  return (
    <Front
      title="Sign in"
      lede={search.has('to') ? 'Sign in, and you are back where you were.' : undefined}
      foot={
        <>
          <span>
            <Link to={paths.forgotPassword}>Forgotten your password?</Link>
          </span>
          <span>
            New here? <Link to={paths.signUp}>Create a company</Link>
          </span>
        </>
      }
    >
      <SignInForm onDone={() => navigate(back, { replace: true })} />
    </Front>
  );
}
