import { infiniteQueryOptions, keepPreviousData, queryOptions } from '@tanstack/react-query';
import type { MemberList, Project, ProjectList, ProjectSort } from '@shared/schemas/api';
import { request } from '@/lib/http';
import { queryKeys } from '@/lib/query-client';

/** The projects that one may see, searched and ordered by the server, a page at a time. */
export const projectsQuery = (q: string, sort: ProjectSort) =>
  infiniteQueryOptions({
    queryKey: [...queryKeys.projects, { q, sort }],
    queryFn: ({ pageParam, signal }) => {
      const search = new URLSearchParams({ sort });
      if (q !== '') search.set('q', q);
      if (pageParam !== null) search.set('cursor', pageParam);
      return request<ProjectList>(`/api/projects?${search}`, { signal });
    },
    initialPageParam: null as string | null,
    getNextPageParam: (last) => last.nextCursor,
    placeholderData: keepPreviousData,
  });

/** One project. */
export const projectQuery = (id: string) =>
  queryOptions({
    queryKey: queryKeys.project(id),
    queryFn: ({ signal }) => request<Project>(`/api/projects/${encodeURIComponent(id)}`, { signal }),
  });

/** The members of a project, by their marks. */
export const membersQuery = (projectId: string) =>
  queryOptions({
    queryKey: queryKeys.members(projectId),
    queryFn: ({ signal }) =>
      request<MemberList>(`/api/projects/${encodeURIComponent(projectId)}/members`, { signal }),
  });
