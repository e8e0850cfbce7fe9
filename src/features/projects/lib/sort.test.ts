import { describe, expect, it } from 'vitest';
import { directionOf, nextSort, readSort } from './sort';

describe('the order of the projects', () => {
  it('reads an address, and falls back on what is due first', () => {
    expect(readSort('-name')).toBe('-name');
    expect(readSort('client')).toBe('client');
    expect(readSort('--name')).toBe('due');
    expect(readSort(null)).toBe('due');
  });

  it('turns round on the second click', () => {
    expect(nextSort('due', 'name')).toBe('name');
    expect(nextSort('name', 'name')).toBe('-name');
    expect(nextSort('-name', 'name')).toBe('name');
    expect(directionOf('-name', 'name')).toBe('descending');
    expect(directionOf('-name', 'due')).toBeNull();
  });
});
