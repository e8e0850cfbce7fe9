import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { calculateMember } from '../../server/engine/calculate-member';
import { readPath } from './read-path';
import { figureTopics, readCases, type Figure } from './reference-data';

const zonesSchema = z.array(z.object({ from: z.number(), to: z.number(), spacing: z.number() }));

function checkFigure(result: unknown, figure: Figure): void {
  if (figure.exists === true) {
    expect(() => readPath(result, figure.of), `${figure.of} is there (${figure.source})`).not.toThrow();
    return;
  }
  const found = readPath(result, figure.of);
  const label = `${figure.of}: ${JSON.stringify(found)} (${figure.source})`;
  if (figure.zones !== undefined) {
    const zones = zonesSchema.parse(found).map(({ from, to, spacing }) => [from, to, spacing]);
    expect(zones, label).toEqual(figure.zones);
  } else if (figure.entries !== undefined) {
    expect(found, label).toHaveLength(figure.entries);
  } else if (typeof figure.is === 'number') {
    if (typeof found !== 'number') throw new Error(`${label} is no number`);
    const off = Math.abs((figure.magnitude === true ? Math.abs(found) : found) - figure.is);
    expect(off, `${label} against ${figure.is}`).toBeLessThanOrEqual(
      figure.abs ?? (figure.rel ?? 1e-6) * Math.abs(figure.is),
    );
  } else {
    if (figure.is === undefined) throw new Error(`${figure.of} says nothing to check`);
    expect(found, label).toBe(figure.is);
  }
}

describe.each(figureTopics)('published figures: %s', (topic) => {
  it.each(readCases(topic))('$id', ({ member, figures }) => {
    const outcome = calculateMember(member);
    if (!outcome.ok) throw new Error(JSON.stringify(outcome.refusal));
    const failures = figures.flatMap((figure) => {
      try {
        checkFigure(outcome.result, figure);
        return [];
      } catch (error) {
        return [error instanceof Error ? error.message : String(error)];
      }
    });
    expect(failures).toEqual([]);
  });
});
