import type { MemberInput } from '@shared/schemas/member';
import type { Random } from './random';

type CaseInput = MemberInput['loadCases'][number];
type LoadInput = NonNullable<CaseInput['loads']>[number];
type CombinationInput = NonNullable<MemberInput['combinations']>[number];
type SupportInput = MemberInput['supports'][number];

export interface RandomBeam {
  length: number;
  supports: SupportInput[];
  hinges: number[];
}

/** One of a list that is not empty. */
const pickOf = <T>(random: Random, [first, ...others]: readonly T[]): T => {
  if (first === undefined) throw new RangeError('nothing to pick from');
  return random.pick(first, ...others);
};

const step = (random: Random, from: number, to: number): number =>
  random.chance(0.7) ? Math.round(random.between(from, to) / 50) * 50 : random.decimal(from, to, 1);

/** Simple spans with and without overhangs, clamped, propped, continuous, sprung and hinged beams; all stable. */
export function randomBeam(random: Random): RandomBeam {
  const span = (): number => step(random, 1200, 4200);
  const arm = (): number => (random.chance(0.5) ? 0 : step(random, 200, 900));
  const kind = random.pick(
    'simple',
    'simple',
    'simple',
    'cantilever',
    'propped',
    'continuous',
    'continuous',
    'sprung',
    'hinged',
    'hung',
    'hung',
  );
  switch (kind) {
    case 'simple': {
      const left = arm();
      const right = left + span();
      const supports: SupportInput[] = [
        { id: 'A', x: left, kind: 'pin' },
        random.chance(0.8)
          ? { id: 'B', x: right, kind: 'roller' }
          : { id: 'B', x: right, kind: 'spring', stiffness: random.whole(300, 9000) },
      ];
      return {
        length: right + arm(),
        supports: random.chance(0.2) ? supports.reverse() : supports,
        hinges: [],
      };
    }
    case 'cantilever': {
      const length = step(random, 900, 2500);
      return { length, supports: [{ id: 'A', x: random.pick(0, length), kind: 'fixed' }], hinges: [] };
    }
    case 'propped': {
      const length = span();
      const other = random.pick('fixed', 'roller', 'roller');
      return {
        length: length + (other === 'roller' ? arm() : 0),
        supports: [
          { id: 'A', x: 0, kind: 'fixed' },
          { id: 'B', x: length, kind: other },
        ],
        hinges: [],
      };
    }
    case 'continuous':
    case 'sprung': {
      let x = arm();
      const supports: SupportInput[] = [{ id: 'S0', x, kind: 'pin' }];
      for (let i = random.whole(2, 3); i > 0; i -= 1) {
        x += span();
        const sprung = kind === 'sprung' && random.chance(0.6);
        supports.push(
          sprung
            ? { id: `S${i}`, x, kind: 'spring', stiffness: random.whole(200, 9000) }
            : { id: `S${i}`, x, kind: 'roller' },
        );
      }
      return { length: x + arm(), supports, hinges: [] };
    }
    case 'hinged': {
      // three supports or four, and one hinge in the second span: one redundant less
      const first = span();
      const second = first + span();
      const hinge = first + Math.round((second - first) * random.between(0.15, 0.6));
      const third = second + span();
      const four = random.chance(0.5);
      const supports: SupportInput[] = [
        { id: 'A', x: 0, kind: random.pick('pin', 'fixed') },
        { id: 'B', x: first, kind: 'roller' },
        { id: 'C', x: second, kind: 'roller' },
      ];
      if (four) supports.push({ id: 'D', x: third, kind: 'roller' });
      return { length: four ? third : second, supports, hinges: [hinge] };
    }
    case 'hung': {
      // a fixed end, and a span hung on its arm
      const hinge = step(random, 500, 1500);
      const length = hinge + span();
      return {
        length,
        supports: [
          { id: 'A', x: 0, kind: 'fixed' },
          { id: 'B', x: length, kind: random.pick('roller', 'roller', 'spring'), stiffness: 2500 },
        ],
        hinges: [hinge],
      };
    }
  }
}

function stillLoad(random: Random, beam: RandomBeam, plies: readonly string[]): LoadInput {
  const { length } = beam;
  const on = plies.length > 0 && random.chance(0.6) ? { on: pickOf(random, plies) } : {};
  const a = step(random, 0, length - 250);
  const from = random.chance(0.4) ? 0 : Math.min(Math.max(a, 0), length - 200);
  const to = random.chance(0.4)
    ? length
    : Math.min(length, from + Math.max(100, step(random, 100, length - from)));
  const x = random.chance(0.15)
    ? random.pick(0, length, ...beam.hinges, ...beam.supports.map((support) => support.x))
    : Math.min(length, step(random, 0, length));
  switch (random.pick('uniform', 'uniform', 'varying', 'point', 'point', 'couple')) {
    case 'uniform':
      return { kind: 'uniform', from, to, value: random.decimal(-0.5, 5, 2), ...on };
    case 'varying':
      return {
        kind: 'varying',
        from,
        to,
        start: random.decimal(0, 4, 2),
        end: random.decimal(-1, 6, 2),
        ...on,
      };
    case 'point':
      return { kind: 'point', x, value: random.whole(-1000, 9000), ...on };
    case 'couple':
      return { kind: 'couple', x, value: random.whole(-2_000_000, 2_000_000) };
  }
}

function movingLoad(random: Random, beam: RandomBeam, plies: readonly string[]): LoadInput {
  const on = plies.length > 0 && random.chance(0.4) ? { on: pickOf(random, plies) } : {};
  const axles = Array.from({ length: random.pick(1, 1, 2, 2, 3, 4) }, () => ({
    offset: step(random, -900, 900),
    value: random.whole(300, 5000),
  }));
  const { length } = beam;
  const travel = random.pick(
    { from: 0, to: length },
    { from: -900, to: length + 900 },
    { from: Math.round(length * 0.2), to: Math.round(length * 0.7) },
  );
  return { kind: 'moving', ...travel, axles, ...on };
}

/** One to four cases; in about a third of all members a train moves in one of them, now and then two. */
export function randomCases(random: Random, beam: RandomBeam, plies: readonly string[]): CaseInput[] {
  const cases = Array.from({ length: random.whole(1, 3) }, (_, i): CaseInput => ({
    id: `L${i}`,
    action: random.pick('permanent', 'imposed', 'snow'),
    selfWeight: i === 0 && random.chance(0.6),
    loads: Array.from({ length: random.whole(1, 3) }, () => stillLoad(random, beam, plies)),
  }));
  if (random.chance(0.35)) {
    cases.push({
      id: 'T',
      action: 'construction',
      loads: Array.from({ length: random.chance(0.15) ? 2 : 1 }, () => movingLoad(random, beam, plies)),
    });
  }
  return cases;
}

/** None at all, or up to four with factors of either sign; some name only part of the cases. */
export function randomCombinations(random: Random, cases: readonly string[]): CombinationInput[] {
  if (random.chance(0.25)) return [];
  return Array.from({ length: random.whole(1, 4) }, (_, i) => ({
    id: `C${i}`,
    factors: Object.fromEntries(
      cases
        .filter((_id, c) => c === i || random.chance(0.85))
        .map((id) => [id, random.pick(1, 1, 1.35, 1.5, 0.9, 0, -0.6)]),
    ),
  }));
}
