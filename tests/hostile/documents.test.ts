import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { refusalCodes } from '@shared/schemas/refusal';
import { resultSchema } from '@shared/schemas/result';
import { calculateMember } from '../../server/engine/calculate-member';
import { mutated, randomFrom } from './mutate';

const examples = new URL('../../examples/', import.meta.url);
const documents: unknown[] = readdirSync(examples)
  .filter((name) => name.endsWith('.json') && name !== 'office.json')
  .map((name) => JSON.parse(readFileSync(new URL(name, examples), 'utf8')) as unknown);

const MOST_MILLISECONDS = 2000;

/** Milliseconds that the processor has spent on this process: what else the machine is busy with does not count. */
function spent(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1000;
}

/** Paths of numbers that JSON cannot hold: NaN and the infinities would leave as null. */
function notFinite(value: unknown, path = ''): string[] {
  if (typeof value === 'number') return Number.isFinite(value) ? [] : [path];
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([key, inner]) => notFinite(inner, `${path}.${key}`));
}

/** What is wrong with what became of a document; empty where it is a sound result or a sound refusal. */
function complaint(input: unknown): { outcome: string; wrong: string[] } {
  const started = spent();
  let outcome: ReturnType<typeof calculateMember>;
  try {
    outcome = calculateMember(input);
  } catch (error) {
    return {
      outcome: 'thrown',
      wrong: [`thrown: ${error instanceof Error ? (error.stack ?? '') : String(error)}`],
    };
  }
  const took = spent() - started;
  const wrong = took > MOST_MILLISECONDS ? [`took ${Math.round(took)} ms`] : [];
  if (outcome.ok) {
    const bad = notFinite(outcome.result);
    if (bad.length > 0) wrong.push(`not finite: ${bad.slice(0, 5).join(' ')}`);
    const parsed = resultSchema.safeParse(outcome.result);
    if (!parsed.success)
      wrong.push(`no result by its schema: ${JSON.stringify(parsed.error.issues.slice(0, 3))}`);
    return { outcome: 'calculated', wrong };
  }
  const { code, message, issues } = outcome.refusal;
  if (!refusalCodes.includes(code)) wrong.push(`code ${JSON.stringify(code)}`);
  if (typeof message !== 'string' || message.length < 5) wrong.push('no message');
  if (!Array.isArray(issues) || issues.length === 0) wrong.push('no issues');
  for (const issue of issues) {
    if (typeof issue.path !== 'string' || typeof issue.message !== 'string' || issue.message.length < 5) {
      wrong.push(`issue ${JSON.stringify(issue)}`);
    }
  }
  if (JSON.stringify(outcome.refusal).length > 100_000) wrong.push('a refusal of more than 100 kB');
  return { outcome: code, wrong };
}

describe('hostile documents', () => {
  it('two thousand of them: each a result of finite numbers or a refusal that says where, none over 2 s', () => {
    const random = randomFrom(26_014);
    const seen = new Map<string, number>();
    const failures: string[] = [];
    for (let i = 0; i < 2000; i += 1) {
      const { outcome, wrong } = complaint(mutated(documents[i % documents.length], random));
      seen.set(outcome, (seen.get(outcome) ?? 0) + 1);
      if (wrong.length > 0) failures.push(`document ${i}: ${wrong.join('; ')}`);
    }
    expect(failures.slice(0, 10)).toEqual([]);
    // both kinds are there in numbers, or nothing was tried
    expect(seen.get('calculated') ?? 0).toBeGreaterThan(200);
    expect(seen.get('invalid-document') ?? 0).toBeGreaterThan(200);
    expect(seen.size).toBeGreaterThan(5);
    expect(Object.hasOwn(Object.prototype, 'polluted')).toBe(false);
  }, 300_000);

  it('the unspoiled ones are all calculated', () => {
    expect(documents.length).toBeGreaterThanOrEqual(8);
    for (const document of documents)
      expect(complaint(document)).toEqual({ outcome: 'calculated', wrong: [] });
  });

  const atTheLimits: [string, () => unknown][] = [
    [
      'two hundred cases of ten loads, five hundred combinations, sixty supports',
      () => ({
        schema: 1,
        length: 59_000,
        supports: Array.from({ length: 60 }, (_, i) => ({
          id: `s${i}`,
          x: i * 1000,
          kind: i === 0 ? 'pin' : 'roller',
        })),
        materials: [{ id: 'w', E: 10_000, density: 400 }],
        pieces: [
          { id: 'a', material: 'w', y: 0, z: 0, width: 100, depth: 50 },
          { id: 'b', material: 'w', y: 0, z: 50, width: 100, depth: 50 },
        ],
        connections: [
          { pieces: ['a', 'b'], kind: 'fasteners', rows: 2, capacity: { basis: 'allowable', value: 900 } },
        ],
        loadCases: Array.from({ length: 200 }, (_, i) => ({
          id: `c${i}`,
          action: 'imposed',
          loads: Array.from({ length: 10 }, (__, j) => ({
            kind: 'point',
            x: (i * 10 + j) * 29.5,
            value: 100 + j,
          })),
        })),
        combinations: Array.from({ length: 500 }, (_, i) => ({
          id: `k${i}`,
          factors: Object.fromEntries(Array.from({ length: 200 }, (__, j) => [`c${j}`, ((i * j) % 7) / 4])),
        })),
        rules: { maxZones: 12 },
      }),
    ],
    [
      'a hundred pieces in ten boxes’ worth of loops',
      () => {
        const pieces = Array.from({ length: 100 }, (_, i) => ({
          id: `p${i}`,
          material: 'w',
          y: (i % 10) * 50,
          z: Math.floor(i / 10) * 40,
          width: 50,
          depth: 40,
        }));
        const joint = (a: number, b: number) => ({
          pieces: [`p${a}`, `p${b}`],
          kind: 'fasteners',
          capacity: { basis: 'allowable', value: 800 },
        });
        return {
          schema: 1,
          length: 6000,
          supports: [
            { id: 'A', x: 0, kind: 'pin' },
            { id: 'B', x: 6000, kind: 'roller' },
          ],
          materials: [{ id: 'w', E: 10_000, density: 400 }],
          pieces,
          connections: pieces.flatMap((_, i) => [
            ...(i % 10 < 9 ? [joint(i, i + 1)] : []),
            ...(i < 90 ? [joint(i, i + 10)] : []),
          ]),
          loadCases: [
            {
              id: 'Q',
              action: 'imposed',
              loads: [{ kind: 'uniform', from: 0, to: 6000, value: 4, on: 'p0' }],
            },
          ],
        };
      },
    ],
    [
      'a train of twenty axles over twelve spans',
      () => ({
        schema: 1,
        length: 36_000,
        supports: Array.from({ length: 13 }, (_, i) => ({
          id: `s${i}`,
          x: i * 3000,
          kind: i === 0 ? 'pin' : 'roller',
        })),
        materials: [{ id: 'w', E: 10_000, density: 400 }],
        pieces: [
          { id: 'a', material: 'w', y: 0, z: 0, width: 100, depth: 50 },
          { id: 'b', material: 'w', y: 0, z: 50, width: 100, depth: 50 },
        ],
        connections: [
          { pieces: ['a', 'b'], kind: 'fasteners', capacity: { basis: 'allowable', value: 9000 } },
        ],
        loadCases: [
          {
            id: 'Q',
            action: 'imposed',
            loads: [
              {
                kind: 'moving',
                from: -9000,
                to: 45_000,
                axles: Array.from({ length: 20 }, (_, i) => ({ offset: i * 433, value: 500 + 41 * i })),
              },
            ],
          },
        ],
        rules: { maxZones: 12, spacingMin: 5 },
      }),
    ],
  ];
  it.each(atTheLimits)('at the limits of a document: %s', (_, make) => {
    expect(complaint(make())).toEqual({ outcome: 'calculated', wrong: [] });
  });

  const crowded: [string, object, object][] = [
    ['a given spacing of a tenth of a micron', { zones: [{ from: 0, to: 2400, spacing: 1e-4 }] }, {}],
    [
      'a smallest spacing and a step of a tenth of a micron',
      {},
      { spacingMin: 1e-4, spacingStep: 1e-4, spacingMax: 1e-3 },
    ],
    ['a smallest spacing of a micron under a heavy load', {}, { spacingMin: 1e-3, spacingStep: 1e-3 }],
    ['a zone grid of a tenth of a micron', {}, { zoneGrid: 1e-4 }],
  ];
  it.each(crowded)('more fasteners or cells than anybody means: %s', (_, change, rules) => {
    const { outcome, wrong } = complaint({
      schema: 1,
      length: 2400,
      supports: [
        { id: 'A', x: 0, kind: 'pin' },
        { id: 'B', x: 2400, kind: 'roller' },
      ],
      materials: [{ id: 'w', E: 10_000 }],
      pieces: [
        { id: 'a', material: 'w', y: 0, z: 0, width: 100, depth: 50 },
        { id: 'b', material: 'w', y: 0, z: 50, width: 100, depth: 50 },
      ],
      connections: [
        { pieces: ['a', 'b'], kind: 'fasteners', capacity: { basis: 'allowable', value: 0.7 }, ...change },
      ],
      loadCases: [{ id: 'Q', action: 'imposed', loads: [{ kind: 'point', x: 900, value: 60_000 }] }],
      rules,
    });
    expect(wrong).toEqual([]);
    expect(['calculated', 'invalid-document']).toContain(outcome);
  });
});
