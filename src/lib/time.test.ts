import { describe, expect, it } from 'vitest';
import { ago, clockTime, dueDay, savedWhen } from './time';

const now = new Date(2026, 11, 1, 14, 30);
const at = (...parts: [number, number, number, number, number]): string => new Date(...parts).toISOString();

describe('times in the words of somebody who looks back', () => {
  it('says how long ago', () => {
    expect(ago(at(2026, 11, 1, 14, 30), now)).toBe('just now');
    expect(ago(at(2026, 11, 1, 14, 18), now)).toBe('12 min ago');
    expect(ago(at(2026, 11, 1, 9, 5), now)).toBe('09:05');
    expect(ago(at(2026, 10, 30, 23, 59), now)).toBe('yesterday');
    expect(ago(at(2026, 10, 26, 8, 0), now)).toBe('Thu');
    expect(ago(at(2026, 10, 3, 8, 0), now)).toBe('3 Nov');
    expect(ago(at(2025, 10, 3, 8, 0), now)).toBe('3 Nov 2025');
  });

  it('counts late days by the calendar, not by hours', () => {
    expect(dueDay('2026-12-01', now)).toEqual({ text: '1 Dec', late: 0 });
    expect(dueDay('2026-12-04', now)).toEqual({ text: '4 Dec', late: 0 });
    expect(dueDay('2026-11-30', now)).toEqual({ text: '30 Nov, 1 day late', late: 1 });
    expect(dueDay('2026-10-16', now)).toEqual({ text: '16 Oct, 46 days late', late: 46 });
  });

  it('leaves the day out where it is today', () => {
    expect(savedWhen(at(2026, 11, 1, 9, 41), now)).toBe('09:41');
    expect(savedWhen(at(2026, 10, 28, 9, 41), now)).toBe('28 Nov, 09:41');
    expect(clockTime(at(2026, 11, 1, 9, 4))).toBe('09:04');
  });
});
