import { Navigate, Outlet, useLocation } from 'react-router-dom';
import { useSessionState } from '../lib/session.js';

/** Pages of an account: without a session the sign-in form comes first, and then the page that was asked for. */
export function SignedIn() {
  const { hint } = useSessionState();
  const { pathname, search } = useLocation();
  if (hint) return <Outlet />;
  return <Navigate to={`/sign-in?to=${encodeURIComponent(pathname + search)}`} replace />;
}
