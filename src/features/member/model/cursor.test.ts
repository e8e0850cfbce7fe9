import { describe, expect, it } from 'vitest';
import { curveAt, moveCursor, pointerGrain, snap, zoneAt } from './cursor';

const events = [0, 900, 1500, 4200];
const press = (key: string, x: number, shiftKey = false) =>
  moveCursor({ key, shiftKey }, x, 20, 4200, events);

describe('the cursor by keyboard', () => {
  it('goes by one step, onto the marks of the tape', () => {
    expect(press('ArrowRight', 1230)).toBe(1240);
    expect(press('ArrowRight', 1240)).toBe(1260);
    expect(press('ArrowLeft', 1230)).toBe(1220);
    expect(press('ArrowLeft', 1220)).toBe(1200);
  });

  it('goes to the next event with Shift', () => {
    expect(press('ArrowRight', 1230, true)).toBe(1500);
    expect(press('ArrowRight', 1500, true)).toBe(4200);
    expect(press('ArrowLeft', 1230, true)).toBe(900);
    expect(press('ArrowLeft', 900, true)).toBe(0);
  });

  it('stays on the beam and goes to its ends', () => {
    expect(press('ArrowRight', 4200)).toBe(4200);
    expect(press('ArrowLeft', 0)).toBe(0);
    expect(press('ArrowLeft', 0, true)).toBe(0);
    expect(press('Home', 1230)).toBe(0);
    expect(press('End', 1230)).toBe(4200);
    expect(press('Enter', 1230)).toBeNull();
  });

  it('counts steps of an inch without drifting off the marks', () => {
    const inch = 25.4;
    let x: number | null = 0;
    for (let i = 0; i < 48; i += 1)
      x = moveCursor({ key: 'ArrowRight', shiftKey: false }, x ?? 0, inch, 4200, events);
    expect(x).toBeCloseTo(48 * inch, 6);
  });
});

describe('the cursor by pointer', () => {
  it('takes round distances no finer than a pixel', () => {
    expect(pointerGrain(5.1, 'metric')).toBe(10);
    expect(pointerGrain(0.7, 'metric')).toBe(1);
    expect(pointerGrain(5.1, 'us')).toBeCloseTo(6.35, 9);
  });

  it('catches on events', () => {
    expect(snap(1234, 4200, 10, events, 20)).toBe(1230);
    expect(snap(1489, 4200, 10, events, 20)).toBe(1500);
    expect(snap(4300, 4200, 10, events, 20)).toBe(4200);
  });
});

describe('reading at the cursor', () => {
  const x = [0, 1000, 1000, 3000];
  const shear = [8, 6, -2, -6];

  it('is linear between stations', () => {
    expect(curveAt(x, shear, 500)).toEqual({ left: 7, right: 7 });
    expect(curveAt(x, shear, 2000)).toEqual({ left: -4, right: -4 });
  });

  it('has two values at a jump, one at the ends', () => {
    expect(curveAt(x, shear, 1000)).toEqual({ left: 6, right: -2 });
    expect(curveAt(x, shear, 0)).toEqual({ left: 8, right: 8 });
    expect(curveAt(x, shear, 3000)).toEqual({ left: -6, right: -6 });
  });

  it('knows the zone, on a border the one to the right', () => {
    const zones = [
      { from: 0, to: 900 },
      { from: 900, to: 4200 },
    ];
    expect(zoneAt(zones, 899)).toBe(0);
    expect(zoneAt(zones, 900)).toBe(1);
    expect(zoneAt(zones, 4200)).toBe(1);
    expect(zoneAt([], 10)).toBe(-1);
  });
});
