import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useCallback } from 'react';

import { sessionSchema, type SessionBody } from '@/contract/account';

import { api, setCsrfToken } from './api-client';

const SESSION_KEY = ['session'];

async function fetchSession(): Promise<SessionBody> {
  const session = await api.get('/session', sessionSchema);
  setCsrfToken(session.csrfToken);
  return session;
}

/** Who is signed in; `undefined` while unknown. */
export function useSession() {
  return useQuery({ queryKey: SESSION_KEY, queryFn: fetchSession, staleTime: 60_000 });
}

/** Forgets what was read as the former person and asks anew who is signed in. */
export function useRefreshSession() {
  const queries = useQueryClient();
  return useCallback(async () => {
    const session = await fetchSession();
    queries.removeQueries({ predicate: (query) => query.queryKey[0] !== SESSION_KEY[0] });
    queries.setQueryData(SESSION_KEY, session);
  }, [queries]);
}
