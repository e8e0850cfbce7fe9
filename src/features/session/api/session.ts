import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { QueryClient } from '@tanstack/react-query';
import type { ChangeMe, Person, Session, SignIn } from '@shared/schemas/api';
import { request } from '@/lib/http';
import { queryKeys } from '@/lib/query-client';

/** Who is signed in; `person` is null where nobody is. */
export const sessionQuery = queryOptions({
  queryKey: queryKeys.session,
  queryFn: ({ signal }) => request<Session>('/api/session', { signal }),
  staleTime: 5 * 60_000,
});

const forgetAllButSession = (client: QueryClient) =>
  client.removeQueries({ predicate: (query) => query.queryKey[0] !== queryKeys.session[0] });

/** Signs in; whatever another person had loaded is forgotten. */
export function useSignIn() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (credentials: SignIn) =>
      request<Session>('/api/session', { method: 'POST', body: credentials }),
    onSuccess: (session) => {
      forgetAllButSession(client);
      client.setQueryData(queryKeys.session, session);
    },
  });
}

/** Ends the session on the server, then on the screen. */
export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => request<null>('/api/session', { method: 'DELETE' }),
    onSuccess: () => {
      client.setQueryData(queryKeys.session, { person: null });
      forgetAllButSession(client);
    },
  });
}

/** Changes units or theme: at once on the screen, and put back where the server does not take it. */
export function useChangeMe() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (change: ChangeMe) => request<Person>('/api/me', { method: 'PATCH', body: change }),
    onMutate: async (change) => {
      await client.cancelQueries({ queryKey: queryKeys.session });
      const before = client.getQueryData<Session>(queryKeys.session);
      if (before?.person)
        client.setQueryData<Session>(queryKeys.session, {
          person: {
            ...before.person,
            units: change.units ?? before.person.units,
            theme: change.theme ?? before.person.theme,
          },
        });
      return { before };
    },
    onError: (_error, _change, context) => client.setQueryData(queryKeys.session, context?.before),
    onSuccess: (person) => client.setQueryData<Session>(queryKeys.session, { person }),
  });
}
