import { describe, expect, it } from 'vitest';
import { elevationScale, fastenerLook, isHidden } from './elevation-geometry';
import { findContacts } from './section-geometry';
import type { DrawnPiece } from './section-geometry';

const piece = (id: string, y: number, z: number, width: number, depth: number): DrawnPiece => ({
  id,
  y,
  z,
  width,
  depth,
  kind: 'solid',
});
const flanged = [piece('P1', 0, 0, 140, 38), piece('P2', 51, 38, 38, 184), piece('P3', 0, 222, 140, 38)];
const box = [
  piece('low', 12, 0, 90, 45),
  piece('high', 12, 255, 90, 45),
  piece('near', 0, 0, 12, 300),
  piece('far', 102, 0, 12, 300),
];

describe('the elevation', () => {
  it('exaggerates depth by a round number and never past its height', () => {
    const scale = elevationScale(flanged, 823 / 4200, 300, 110);
    expect(scale.exaggeration).toBe(2);
    expect(scale.bottom - scale.top).toBeCloseTo((260 * 2 * 823) / 4200, 9);
    expect(scale.y(0)).toBe(300);
  });

  it('knows what stands behind something else', () => {
    expect(box.map((one) => isHidden(one, box))).toEqual([true, true, false, true]);
    expect(flanged.some((one) => isHidden(one, flanged))).toBe(false);
  });
});

describe('fasteners from the side', () => {
  const contacts = findContacts(flanged);
  const first = contacts[0];
  if (!first) throw new Error('an I has interfaces');

  it('go in from the thinner piece, as far as they are long', () => {
    const look = fastenerLook(
      { contact: first, positions: [[75], [75]], length: 80, through: false },
      flanged,
    );
    // from the lower face of the bottom flange 80 mm upward; the second row stands behind the first
    expect(look).toEqual({
      kind: 'line',
      head: 0,
      tip: 80,
      through: false,
      rows: [{ xs: [75], faint: false }],
    });
  });

  it('never come out at the far side, and go in where one says', () => {
    const look = fastenerLook(
      { contact: first, positions: [[75]], length: 400, headSide: 'P2', through: false },
      flanged,
    );
    expect(look).toMatchObject({ head: 222, tip: 0 });
  });

  it('are heads where pieces stand side by side, a height for each row', () => {
    const [contact] = findContacts(box).filter((one) => one.pieces.includes('near'));
    if (!contact) throw new Error('the near web touches a flange');
    const look = fastenerLook({ contact, positions: [[50], [50]], through: false }, box);
    expect(look).toEqual({
      kind: 'heads',
      faint: false,
      rows: [
        { z: 11.25, xs: [50] },
        { z: 33.75, xs: [50] },
      ],
    });
  });
});
