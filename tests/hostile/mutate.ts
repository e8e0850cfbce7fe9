/** Spoils a document at random places; the same seed spoils it the same way. */

export type Random = () => number;

/** A small generator of numbers in [0, 1) from a seed: mulberry32, public domain, by Tommy Ettinger. */
export function randomFrom(seed: number): Random {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4_294_967_296;
  };
}

type Holder = Record<string, unknown> | unknown[];
interface Spot {
  holder: Holder;
  key: string;
  value: unknown;
}

const isHolder = (value: unknown): value is Holder => typeof value === 'object' && value !== null;

/** Enough places to choose from; a document may hold far more, nested deeper than a call can go. */
const MOST_SPOTS = 30_000;

function spotsOf(root: Holder): Spot[] {
  const found: Spot[] = [];
  const waiting: Holder[] = [root];
  for (
    let holder = waiting.pop();
    holder !== undefined && found.length < MOST_SPOTS;
    holder = waiting.pop()
  ) {
    for (const [key, value] of Object.entries(holder)) {
      found.push({ holder, key, value });
      if (isHolder(value)) waiting.push(value);
    }
  }
  return found;
}

function put({ holder, key }: Spot, value: unknown): void {
  if (Array.isArray(holder)) holder[Number(key)] = value;
  else Object.defineProperty(holder, key, { value, enumerable: true, configurable: true, writable: true });
}

function remove({ holder, key }: Spot): void {
  if (Array.isArray(holder)) holder.splice(Number(key), 1);
  else Reflect.deleteProperty(holder, key);
}

const nested = (depth: number): unknown => {
  let value: unknown = 1;
  for (let i = 0; i < depth; i += 1) value = i % 2 === 0 ? [value] : { loads: value };
  return value;
};

const strangeNumbers = [
  NaN,
  Infinity,
  -Infinity,
  1e308,
  -1e308,
  -0,
  0,
  5e-324,
  1e-12,
  1e12,
  1e300,
  -1,
  -3600,
  0.1 + 0.2,
  2 ** 53,
  2 ** 31,
  1 / 3,
];
const strangeValues = (random: Random): unknown[] => [
  null,
  undefined,
  true,
  false,
  '',
  ' ',
  '3600',
  '1e3',
  'NaN',
  '__proto__',
  'constructor',
  'a'.repeat(201),
  'b'.repeat(200_000),
  '\u0000\uffff\ud800',
  [],
  {},
  [[]],
  [null],
  nested(4000),
  Array.from({ length: 5000 }, () => 0),
  new Date(0),
  Symbol('s'),
  () => 1,
  10n,
  { toString: 1, valueOf: 2 },
  Object.create(null),
  JSON.parse('{"__proto__":{"polluted":true},"constructor":1}'),
  random(),
];

/** One way to spoil a document; it may leave it as it was where it does not apply. */
type Mutation = (root: Record<string, unknown>, random: Random) => void;

const choose = <T>(list: readonly T[], random: Random): T | undefined =>
  list[Math.floor(random() * list.length)];

const anywhere =
  (change: (spot: Spot, random: Random) => void): Mutation =>
  (root, random) => {
    const spot = choose(spotsOf(root), random);
    if (spot !== undefined) change(spot, random);
  };

const atNumber =
  (change: (value: number, random: Random) => unknown): Mutation =>
  (root, random) => {
    const spot = choose(
      spotsOf(root).filter(({ value }) => typeof value === 'number'),
      random,
    );
    if (spot !== undefined && typeof spot.value === 'number') put(spot, change(spot.value, random));
  };

const atList =
  (change: (list: unknown[], random: Random) => void): Mutation =>
  (root, random) => {
    const lists = spotsOf(root).flatMap(({ value }) => (Array.isArray(value) ? [value as unknown[]] : []));
    const list = choose(lists, random);
    if (list !== undefined) change(list, random);
  };

const atText =
  (change: (value: string, root: Record<string, unknown>, random: Random) => unknown): Mutation =>
  (root, random) => {
    const spot = choose(
      spotsOf(root).filter(({ value }) => typeof value === 'string'),
      random,
    );
    if (spot !== undefined && typeof spot.value === 'string') put(spot, change(spot.value, root, random));
  };

const swapEnds: Mutation = (root, random) => {
  const holders = spotsOf(root).flatMap(({ value }) =>
    isHolder(value) && !Array.isArray(value) && 'from' in value && 'to' in value ? [value] : [],
  );
  const holder = choose(holders, random);
  if (holder !== undefined) [holder['from'], holder['to']] = [holder['to'], holder['from']];
};

const mutations: Mutation[] = [
  anywhere((spot) => remove(spot)),
  anywhere((spot, random) => put(spot, choose(strangeValues(random), random))),
  anywhere((spot, random) => put(spot, choose(strangeNumbers, random))),
  anywhere(({ holder }, random) => {
    if (Array.isArray(holder)) return;
    const key = choose(
      ['__proto__', 'constructor', 'hasOwnProperty', 'toString', 'extra', 'on', 'zones', 'bead', 'rules'],
      random,
    );
    put({ holder, key: key ?? 'extra', value: null }, choose([...strangeValues(random), 1, 'P1'], random));
  }),
  atNumber((_, random) => choose(strangeNumbers, random)),
  atNumber((value, random) => value * (choose([-1, 0, 1e-6, 1e-3, 0.5, 2, 1e3, 1e6, 1e9], random) ?? 1)),
  atNumber((value, random) => value + (random() - 0.5) * 2 ** Math.floor(random() * 24)),
  atNumber((value, random) => value + (choose([1e-9, -1e-9, 1e-7, 1e-6, 1e-5, 1, -1], random) ?? 0)),
  atNumber((value) => String(value)),
  atNumber((value) => [value]),
  atList((list) => {
    if (list.length > 0) list.push(structuredCloneOr(list[0]));
  }),
  atList((list) => list.reverse()),
  atList((list) => list.splice(0)),
  atList((list, random) => list.splice(Math.floor(random() * list.length), 1)),
  atList((list, random) => {
    const times = choose([50, 150, 600, 2500], random) ?? 50;
    const [first] = list;
    if (isHolder(first) && spotsOf(first).length > 500) return;
    for (let i = 0; i < times; i += 1) {
      const copy = structuredCloneOr(first);
      if (isHolder(copy) && !Array.isArray(copy) && 'id' in copy) copy['id'] = `x${i}`;
      if (isHolder(copy) && !Array.isArray(copy) && typeof copy['x'] === 'number')
        copy['x'] = Math.abs(copy['x'] - i);
      if (isHolder(copy) && !Array.isArray(copy) && typeof copy['z'] === 'number')
        copy['z'] = copy['z'] - 300 * (i + 1);
      list.push(copy);
    }
  }),
  atText((_, root, random) => {
    const texts = spotsOf(root).flatMap(({ value }) => (typeof value === 'string' ? [value] : []));
    return choose(texts, random);
  }),
  atText((_, __, random) =>
    choose(
      [
        'kind',
        'moving',
        'couple',
        'fixed',
        'spring',
        'adhesive',
        'continuous',
        'nds',
        'ec5',
        'test',
        'steel',
        'gamma',
      ],
      random,
    ),
  ),
  swapEnds,
  (root, random) => (root['length'] = choose([1, 1e-3, 10, 400, 2400.5, 12_345, 1e6, 1e7, 1e9], random)),
  (root) => (root['supports'] = []),
  (root, random) => {
    const { length } = root;
    if (typeof length === 'number')
      root['hinges'] = Array.from({ length: 1 + Math.floor(random() * 4) }, () => random() * length);
  },
  (root, random) => {
    root['rules'] = {
      spacingStep: choose([1e-6, 0.01, 1, 7, 1000], random),
      spacingMin: choose([1e-6, 1, 40, 500], random),
      spacingMax: choose([1, 300, 1e9], random),
      maxZones: choose([1, 2, 12, 13, 1.5], random),
      zoneGrid: choose([1e-6, 1, 10, 100, 1e9], random),
      minZoneLength: choose([0, 1, 300, 1e9], random),
      mirror: random() < 0.5,
    };
  },
];

/** Values that cannot be cloned (functions, symbols) stand as they are. */
function structuredCloneOr(value: unknown): unknown {
  try {
    return structuredClone(value);
  } catch {
    return value;
  }
}

/** A copy of the document, spoiled one to four times; now and then something that is no document at all. */
export function mutated(document: unknown, random: Random): unknown {
  if (random() < 0.02) return choose([...strangeValues(random), ...strangeNumbers], random);
  const copy = structuredClone(document);
  if (!isHolder(copy) || Array.isArray(copy)) throw new Error('a document is an object');
  const times = 1 + Math.floor(random() * 4);
  for (let i = 0; i < times; i += 1) choose(mutations, random)?.(copy, random);
  return copy;
}
