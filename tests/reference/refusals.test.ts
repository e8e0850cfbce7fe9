import { describe, expect, it } from 'vitest';
import { calculateMember } from '../../server/engine/calculate-member';
import { refusalCodes, type Refusal } from '@shared/schemas/refusal';
import { readCases, readRefusals } from './reference-data';

function refusalOf(member: unknown): Refusal {
  const outcome = calculateMember(member);
  if (outcome.ok) throw new Error('it was calculated');
  return outcome.refusal;
}

/** An issue speaks of a place when it names it, something within it, or what it lies in, short of the whole document. */
const speaksOf = (path: string, place: string): boolean =>
  path !== '' && (path === place || path.startsWith(`${place}.`) || place.startsWith(`${path}.`));

/** A sound member to spoil: the first beam of the reference data. */
function sound(): Record<string, unknown> {
  const member = structuredClone(readCases('beams')[0]?.member);
  if (typeof member !== 'object' || member === null) throw new Error('no member');
  return { ...member };
}
const uniform = { kind: 'uniform', from: 0, to: 4200, value: 1.7 };
const loadCase = (loads: unknown[]) => [{ id: 'Q', name: 'Q', action: 'imposed', loads }];

describe('documents with one thing wrong', () => {
  it.each(readRefusals())('$id', ({ code, paths, member }) => {
    const refusal = refusalOf(member);
    expect(refusalCodes).toContain(refusal.code);
    expect(refusal.code).toBe(code);
    expect(refusal.message.length).toBeGreaterThan(10);
    expect(refusal.issues.length).toBeGreaterThan(0);
    for (const issue of refusal.issues) expect(issue.message.length).toBeGreaterThan(5);
    const said = refusal.issues.map(({ path }) => path);
    expect(
      said.some((path) => paths.some((place) => speaksOf(path, place))),
      `${said.join(' ')} for ${paths.join(' ')}`,
    ).toBe(true);
  });

  it('says of a capacity by a yield model that it is not there yet, in words of its own', () => {
    const messages = readRefusals()
      .filter(({ code }) => code === 'not-available')
      .map(({ member }) => refusalOf(member).message);
    expect(messages).toHaveLength(2);
    const others = new Set(
      readRefusals()
        .filter(({ code }) => code !== 'not-available')
        .map(({ member }) => refusalOf(member).message),
    );
    for (const message of messages) expect(others.has(message)).toBe(false);
  });
});

describe('the limits of a document, each named in its refusal', () => {
  const many = (n: number, make: (i: number) => unknown): unknown[] =>
    Array.from({ length: n }, (_, i) => make(i));
  const piece = (i: number) => ({ id: `q${i}`, material: 'w', y: 0, z: i * 10, width: 100, depth: 10 });
  const support = (i: number) => ({ id: `s${i}`, x: i * 10, kind: 'roller' });
  const beyond: [string, string, string, (member: Record<string, unknown>) => void][] = [
    ['101 pieces', '100', 'pieces', (m) => (m['pieces'] = many(101, piece))],
    ['61 supports', '60', 'supports', (m) => (m['supports'] = many(61, support))],
    [
      '201 load cases',
      '200',
      'loadCases',
      (m) => (m['loadCases'] = many(201, (i) => ({ id: `c${i}`, action: 'imposed', loads: [uniform] }))),
    ],
    [
      '501 combinations',
      '500',
      'combinations',
      (m) => (m['combinations'] = many(501, (i) => ({ id: `c${i}`, factors: { Q: 1 } }))),
    ],
    [
      '2 001 loads in one case',
      '2000',
      'loadCases',
      (m) => (m['loadCases'] = loadCase(many(2001, (i) => ({ kind: 'point', x: i, value: 3 })))),
    ],
    [
      '2 002 loads in two cases',
      '2000',
      'loadCases',
      (m) =>
        (m['loadCases'] = ['a', 'b'].map((id) => ({
          id,
          action: 'imposed',
          loads: many(1001, (i) => ({ kind: 'point', x: i, value: 3 })),
        }))),
    ],
    [
      '21 axles',
      '20',
      'loadCases.0.loads.0.axles',
      (m) =>
        (m['loadCases'] = loadCase([
          { kind: 'moving', from: 0, to: 900, axles: many(21, (i) => ({ offset: i, value: 9 })) },
        ])),
    ],
    ['13 zones', '12', 'rules.maxZones', (m) => (m['rules'] = { maxZones: 13 })],
    ['a title of 201 characters', '200', 'title', (m) => (m['title'] = 'a'.repeat(201))],
    [
      'a name of 201 characters',
      '200',
      'materials.0.name',
      (m) => (m['materials'] = [{ id: 'w', E: 1, name: 'b'.repeat(201) }]),
    ],
  ];
  it.each(beyond)('%s', (_, limit, place, spoil) => {
    const member = sound();
    expect(calculateMember(member).ok).toBe(true);
    spoil(member);
    const refusal = refusalOf(member);
    const said = refusal.issues.find(({ path }) => speaksOf(path, place) || path === '');
    expect(said?.message.replace(/[\s,.](?=\d)/g, '')).toContain(limit);
  });

  it('100 pieces, 60 supports and 12 zones are within them', () => {
    const member = sound();
    const rows = many(100, piece);
    member['pieces'] = rows;
    member['connections'] = many(99, (i) => ({
      pieces: [`q${i}`, `q${i + 1}`],
      kind: 'fasteners',
      capacity: { basis: 'allowable', value: 900 },
    }));
    member['supports'] = many(60, support);
    member['rules'] = { maxZones: 12, minZoneLength: 100 };
    const outcome = calculateMember(member);
    expect(outcome.ok ? 'calculated' : outcome.refusal).toBe('calculated');
  });
});
