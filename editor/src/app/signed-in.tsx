import { Suspense } from 'react';
import { Navigate, Outlet, useLocation } from 'react-router-dom';
import { useMaybeMe } from '../lib/me';
import { to } from './paths';
import { StartingUp } from './route-failure';

/** Everything below is for somebody who is signed in; when that ends, the sign-in page keeps where they were. */
export function SignedIn() {
  const me = useMaybeMe();
  const { pathname, search } = useLocation();
  if (me.data === null) return <Navigate to={to.signIn(`${pathname}${search}`)} replace />;
  return (
    <Suspense fallback={<StartingUp />}>
      <Outlet />
    </Suspense>
  );
}
