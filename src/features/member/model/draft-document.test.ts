import { describe, expect, it } from 'vitest';
import {
  capacityOnBasis,
  connectionOfKind,
  differences,
  newConnection,
  piecesOf,
  sameJson,
  valueAt,
  withValueAt,
} from './draft-document';
import { remember, stepBack } from './history';
import type { History } from './history';
import { wordsForPath } from './words';

const document = {
  title: 'T',
  connections: [
    {
      pieces: ['lower', 'upper'],
      kind: 'fasteners',
      rows: 2,
      capacity: { basis: 'ultimate', value: 900, factorOfSafety: 2.4 },
    },
  ],
};

describe('changing a draft', () => {
  it('sets a value and leaves the draft given alone', () => {
    const next = withValueAt(document, 'connections.0.capacity.value', 950);
    expect(valueAt(next, 'connections.0.capacity.value')).toBe(950);
    expect(valueAt(document, 'connections.0.capacity.value')).toBe(900);
    expect(differences(document, next)).toEqual(['connections.0.capacity.value']);
  });

  it('leaves no trace of what is emptied', () => {
    const ruled = withValueAt(document, 'connections.0.rules.spacingMax', 250);
    expect(valueAt(ruled, 'connections.0.rules')).toEqual({ spacingMax: 250 });
    expect(withValueAt(ruled, 'connections.0.rules.spacingMax', undefined)).toEqual(document);
  });

  it('compares by what is said, not by the order of keys', () => {
    expect(sameJson({ a: 1, b: [1, 2] }, { b: [1, 2], a: 1 })).toBe(true);
    expect(sameJson({ a: 1 }, { a: 1, b: undefined })).toBe(true);
    expect(sameJson({ a: [1, 2] }, { a: [2, 1] })).toBe(false);
    expect(sameJson({ a: null }, { a: {} })).toBe(false);
  });
});

describe('connections', () => {
  it('does not carry a value over to another unit or meaning', () => {
    const [first] = document.connections;
    expect(connectionOfKind(first, 'adhesive')).toEqual({
      pieces: ['lower', 'upper'],
      kind: 'adhesive',
      capacity: { basis: 'ultimate', factorOfSafety: 2.4 },
    });
    expect(capacityOnBasis(first?.capacity, 'allowable')).toEqual({ basis: 'allowable' });
    expect(capacityOnBasis(first?.capacity, 'test')).toEqual({
      basis: 'test',
      factorOfSafety: 2.4,
      values: [],
    });
  });

  it('starts a new one from the last one of fasteners, without its pinned zones and head side', () => {
    const model = { ...document.connections[0], fastener: { type: 'nail', headSide: 'upper' }, zones: [{}] };
    expect(newConnection({ connections: [model] }, ['a', 'b'])).toEqual({
      pieces: ['a', 'b'],
      kind: 'fasteners',
      rows: 2,
      capacity: { basis: 'ultimate', value: 900, factorOfSafety: 2.4 },
      fastener: { type: 'nail' },
    });
    expect(newConnection({}, ['a', 'b'])).toMatchObject({ pieces: ['a', 'b'], kind: 'fasteners', rows: 1 });
  });

  it('draws only pieces whose numbers are numbers', () => {
    const pieces = [
      { id: 'a', material: 'w', y: 0, z: 0, width: 95, depth: 45 },
      { id: 'b', material: 'w', y: 0, z: '45', width: 95, depth: 45 },
      { id: 'c', material: 'w', y: 0, z: 45, width: 95, depth: -1 },
    ];
    expect(piecesOf({ pieces, materials: [{ id: 'w', kind: 'plywood' }] })).toEqual([
      { id: 'a', y: 0, z: 0, width: 95, depth: 45, kind: 'plywood' },
    ]);
    expect(piecesOf({ pieces: 'none' })).toEqual([]);
  });
});

describe('the way back', () => {
  it('goes a step for each field, typing on in one is one step', () => {
    let history: History = [];
    history = remember(history, { rows: 1 }, 'rows', 0);
    history = remember(history, { rows: 2 }, 'rows', 400);
    history = remember(history, { rows: 23 }, 'title', 500);
    history = remember(history, { rows: 23, title: 'A' }, 'rows', 9_000);
    const first = stepBack(history);
    expect(first?.document).toEqual({ rows: 23, title: 'A' });
    const second = stepBack(first?.history ?? []);
    expect(second?.document).toEqual({ rows: 23 });
    const third = stepBack(second?.history ?? []);
    expect(third?.document).toEqual({ rows: 1 });
    expect(stepBack(third?.history ?? [])).toBeNull();
  });
});

describe('words', () => {
  it('names a place by what stands there', () => {
    expect(wordsForPath(document, 'connections.0.capacity.value')).toBe(
      'connection lower–upper · capacity · value',
    );
    expect(wordsForPath({ pieces: [{ id: 'P1' }] }, 'pieces.0.z')).toBe('pieces P1 · z');
    expect(wordsForPath(document, '')).toBe('the document');
  });
});
