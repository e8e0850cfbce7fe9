import { QueryCache, QueryClient } from '@tanstack/react-query';
import { NoAnswerError, ProblemError } from './http';

/** Names the cache's entries, so that what saves and what shows agree. */
export const queryKeys = {
  session: ['session'] as const,
  projects: ['projects'] as const,
  project: (id: string) => ['project', id] as const,
  members: (projectId: string) => ['members', projectId] as const,
  member: (id: string) => ['member', id] as const,
};

/** A refusal is final; an absent server is asked twice more. */
const retry = (failures: number, error: Error): boolean =>
  (error instanceof NoAnswerError || (error instanceof ProblemError && error.status >= 500)) && failures < 2;

/** One cache for the page. An answer of 401 to anything ends the session on the screen, too. */
export function createQueryClient(): QueryClient {
  const client = new QueryClient({
    queryCache: new QueryCache({
      onError: (error) => {
        if (error instanceof ProblemError && error.status === 401)
          client.setQueryData(queryKeys.session, { person: null });
      },
    }),
    defaultOptions: { queries: { retry, staleTime: 15_000 }, mutations: { retry: false } },
  });
  return client;
}
