import { describe, expect, it } from 'vitest';
import { alternate, dimensionStops, findContacts, findOverlaps, spread } from './section-geometry';
import type { DrawnPiece } from './section-geometry';

const piece = (id: string, y: number, z: number, width: number, depth: number): DrawnPiece => ({
  id,
  y,
  z,
  width,
  depth,
  kind: 'solid',
});

// an I: two flanges and a web between them
const flanged = [
  piece('bottom', 0, 0, 140, 38),
  piece('web', 51, 38, 38, 184),
  piece('top', 0, 222, 140, 38),
];

describe('interfaces from geometry', () => {
  it('numbers them by the earlier piece, then the later', () => {
    expect(findContacts(flanged)).toEqual([
      {
        id: 'J1',
        pieces: ['bottom', 'web'],
        orientation: 'horizontal',
        from: { y: 51, z: 38 },
        to: { y: 89, z: 38 },
      },
      {
        id: 'J2',
        pieces: ['web', 'top'],
        orientation: 'horizontal',
        from: { y: 51, z: 222 },
        to: { y: 89, z: 222 },
      },
    ]);
  });

  it('finds faces side by side, and none where only corners meet', () => {
    const plies = [piece('a', 0, 0, 45, 220), piece('b', 45, 20, 45, 220), piece('c', 90, 240, 45, 45)];
    expect(findContacts(plies)).toEqual([
      {
        id: 'J1',
        pieces: ['a', 'b'],
        orientation: 'vertical',
        from: { y: 45, z: 20 },
        to: { y: 45, z: 220 },
      },
    ]);
  });

  it('tells touching from overlapping', () => {
    expect(findOverlaps(flanged)).toEqual([]);
    const raised = flanged.map((one) => (one.id === 'bottom' ? { ...one, z: 14 } : one));
    expect(findOverlaps(raised)).toEqual([{ pieces: ['bottom', 'web'], y: 51, z: 38, width: 38, depth: 14 }]);
    expect(findContacts(raised).map((contact) => contact.pieces)).toEqual([['web', 'top']]);
  });

  it('gives neighbours different timber', () => {
    const colours = alternate(flanged, findContacts(flanged));
    expect(colours.get('bottom')).toBe(0);
    expect(colours.get('web')).toBe(1);
    expect(colours.get('top')).toBe(0);
  });
});

describe('what is written beside a section', () => {
  it('breaks a chain of dimensions at every edge, once', () => {
    expect(dimensionStops([0, 38, 38, 222, 222, 260], 1)).toEqual([0, 38, 222, 260]);
    expect(dimensionStops([0, 38, 38.4, 222, 259.9, 260], 1)).toEqual([0, 38, 222, 260]);
  });

  it('keeps labels apart and within bounds', () => {
    expect(spread([10, 12, 50], 20, 0, 100)).toEqual([10, 30, 50]);
    expect(spread([90, 95, 99], 20, 0, 100)).toEqual([60, 80, 100]);
    expect(spread([50, 10], 5, 0, 100)).toEqual([50, 10]);
  });
});
