import type { Me } from '@foldwell/contracts';
import { queryOptions, useQuery } from '@tanstack/react-query';
import { createContext, type ReactNode, useContext } from 'react';
import { Navigate, useLocation } from 'react-router-dom';

import { api, Problem, setCsrf } from './api-client';

/** Who is signed in; asked again after sign-in, since the token is new then. */
export const meQuery = queryOptions({
  queryKey: ['me'],
  queryFn: async () => {
    const me = await api<Me>('/me');
    setCsrf(me.csrf);
    return me;
  },
  retry: (count, error) => !(error instanceof Problem) && count < 2,
  staleTime: 60_000,
});

const MeContext = createContext<Me | null>(null);

/** The person signed in; only under SignedIn. */
export function useMe(): Me {
  const me = useContext(MeContext);
  if (!me) throw new Error('useMe outside SignedIn');
  return me;
}

/** Whether the person has one of these roles. */
export function useMay(...roles: Me['roles']): boolean {
  return useMe().roles.some((role) => roles.includes(role));
}

/** Shows its children to who is signed in; sends others to sign in and back. */
export function SignedIn({ children }: { children: ReactNode }) {
  const me = useQuery(meQuery);
  const { pathname, search } = useLocation();
  if (me.isPending)
    return (
      <p className="p-6 soft" role="status">
        Opening the house.
      </p>
    );
  if (me.error instanceof Problem && me.error.body.status === 401)
    return <Navigate to={`/sign-in?back=${encodeURIComponent(pathname + search)}`} replace />;
  if (me.isError)
    return (
      <p className="p-6" role="alert">
        {me.error.message}
      </p>
    );
  if (me.data.mustChangePassword && pathname !== '/password')
    return <Navigate to="/password" replace />;
  if (me.data.roles.every((role) => role === 'retailer') && pathname !== '/counter')
    return <Navigate to="/counter" replace />;
  return <MeContext value={me.data}>{children}</MeContext>;
}
