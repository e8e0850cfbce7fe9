import { queryOptions } from '@tanstack/react-query';
import type { Draft, Member } from '@shared/schemas/api';
import { request } from '@/lib/http';
import { queryKeys } from '@/lib/query-client';
import type { DraftDocument } from '../model/draft-document';

const fetchMember = (id: string, signal?: AbortSignal) =>
  request<Member>(`/api/members/${encodeURIComponent(id)}`, { signal });

/**
 * A member with its document and result, as it is when its page opens. From then on the page's own saver holds
 * the newest; the cache keeps nothing back for a later visit.
 */
export const memberQuery = (id: string) =>
  queryOptions({
    queryKey: queryKeys.member(id),
    queryFn: ({ signal }) => fetchMember(id, signal),
    gcTime: 0,
    staleTime: Infinity,
  });

/** What the server holds now, past every cache. */
export const fetchCurrentMember = fetchMember;

/**
 * Saves the document over `version`; answers it with its result or the issues for which it was refused.
 * Rejects with a 412 problem where somebody else has saved since.
 */
export function saveDraft(
  id: string,
  document: DraftDocument,
  version: number,
  signal: AbortSignal,
): Promise<Draft> {
  return request<Draft>(`/api/members/${encodeURIComponent(id)}/draft`, {
    method: 'PUT',
    body: { document },
    headers: { 'if-match': `"${version}"` },
    signal,
  });
}
