import type { ProjectSort } from '@shared/schemas/api';

const keys = ['number', 'name', 'client', 'members', 'designer', 'checker', 'due', 'change'] as const;
type Key = (typeof keys)[number];

/** What is due first is on top unless one says otherwise. */
export const usualSort: ProjectSort = 'due';

/** The order that an address asks for; the usual one where it asks for none that exists. */
export function readSort(text: string | null): ProjectSort {
  for (const key of keys) {
    if (text === key) return key;
    if (text === `-${key}`) return `-${key}`;
  }
  return usualSort;
}

/** Which way a column is ordered, or null. */
export function directionOf(sort: ProjectSort, key: Key): 'ascending' | 'descending' | null {
  if (sort === key) return 'ascending';
  return sort === `-${key}` ? 'descending' : null;
}

/** The order after a click on a column's head: that column, or the other way round. */
export function nextSort(sort: ProjectSort, key: ProjectSort): ProjectSort {
  return sort === key ? readSort(`-${key}`) : key;
}
