import { queryOptions, useQuery } from '@tanstack/react-query';
import { createContext, useContext } from 'react';
import type { Reply } from '../../shared/api/endpoint.ts';
import { getSession } from '../../shared/api/session.ts';
import { call } from './call.ts';

export const sessionQuery = queryOptions({
  queryKey: ['session'],
  queryFn: ({ signal }) => call(getSession, {}, signal),
  staleTime: 60_000,
});

export type SessionActor = NonNullable<Reply<typeof getSession>['actor']>;

const ActorContext = createContext<SessionActor | null>(null);
export const ActorProvider = ActorContext.Provider;

/** Whoever is signed in; only within the pages that need it. */
export function useActor(): SessionActor {
  const actor = useContext(ActorContext);
  if (!actor) throw new Error('This page is shown to people who are signed in.');
  return actor;
}

export function useSession() {
  return useQuery(sessionQuery);
}
