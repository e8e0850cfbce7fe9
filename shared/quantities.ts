/** What each quantity is measured in: the spellings people type, and the unit each person reads. */

export type UnitSystem = 'metric' | 'us';

/**
 * What a number measures. `length` runs along the beam (feet and inches in US units), `size` is a dimension of a
 * piece or fastener or a spacing (inches); `flow` is force per length at an interface, `lineLoad` a load on the beam;
 * `rigidity` is EI.
 */
export type Quantity =
  | 'length'
  | 'size'
  | 'force'
  | 'lineLoad'
  | 'flow'
  | 'moment'
  | 'stress'
  | 'stiffness'
  | 'density'
  | 'mass'
  | 'rigidity';

/** mm, by definition */
export const INCH = 25.4;
/** exact by definition: 0.45359237 kg × 9.80665 m/s² */
export const POUND = 0.45359237 * 9.80665;
/** m/s², standard gravity, by definition (CGPM 1901) */
export const GRAVITY = 9.80665;

const table = (entries: Record<string, number>): ReadonlyMap<string, number> =>
  new Map(Object.entries(entries));

const lengths = table({
  mm: 1,
  millimetre: 1,
  millimetres: 1,
  millimeters: 1,
  cm: 10,
  dm: 100,
  m: 1000,
  metre: 1000,
  metres: 1000,
  meters: 1000,
  "'": 12 * INCH,
  ft: 12 * INCH,
  foot: 12 * INCH,
  feet: 12 * INCH,
  '"': INCH,
  in: INCH,
  'in.': INCH,
  inch: INCH,
  inches: INCH,
});

const forces = table({
  n: 1,
  kn: 1e3,
  mn: 1e6,
  kg: GRAVITY,
  t: 1000 * GRAVITY,
  lb: POUND,
  lbs: POUND,
  lbf: POUND,
  '#': POUND,
  k: 1000 * POUND,
  kip: 1000 * POUND,
  kips: 1000 * POUND,
});

const perLength = table({
  'n/mm': 1,
  'kn/m': 1,
  'n/m': 1e-3,
  'kn/mm': 1e3,
  'n/cm': 0.1,
  'kg/m': GRAVITY / 1000,
  plf: POUND / (12 * INCH),
  'lb/ft': POUND / (12 * INCH),
  'lbf/ft': POUND / (12 * INCH),
  'lb/in': POUND / INCH,
  'lbf/in': POUND / INCH,
  pli: POUND / INCH,
  klf: (1000 * POUND) / (12 * INCH),
  'kip/ft': (1000 * POUND) / (12 * INCH),
});

const moments = table({
  'n*mm': 1,
  nmm: 1,
  'n*m': 1e3,
  nm: 1e3,
  'kn*m': 1e6,
  knm: 1e6,
  'lb*ft': POUND * 12 * INCH,
  'lb-ft': POUND * 12 * INCH,
  'ft*lb': POUND * 12 * INCH,
  'ft-lb': POUND * 12 * INCH,
  'lb*in': POUND * INCH,
  'lb-in': POUND * INCH,
  'kip*ft': 1000 * POUND * 12 * INCH,
  'kip-ft': 1000 * POUND * 12 * INCH,
});

const stresses = table({
  mpa: 1,
  'n/mm2': 1,
  'n/mm^2': 1,
  'mn/m2': 1,
  gpa: 1e3,
  kpa: 1e-3,
  'kn/m2': 1e-3,
  'kn/mm2': 1e3,
  pa: 1e-6,
  psi: POUND / INCH ** 2,
  ksi: (1000 * POUND) / INCH ** 2,
  psf: POUND / (12 * INCH) ** 2,
});

const POUND_MASS_PER_CUBIC_FOOT = 0.45359237 / 0.3048 ** 3;
const densities = table({
  'kg/m3': 1,
  'kg/m^3': 1,
  'g/cm3': 1000,
  'lb/ft3': POUND_MASS_PER_CUBIC_FOOT,
  pcf: POUND_MASS_PER_CUBIC_FOOT,
});

const masses = table({ 'kg/m': 1, 'lb/ft': 0.45359237 / 0.3048, plf: 0.45359237 / 0.3048 });

interface Shown {
  unit: string;
  /** stored units in one of the unit shown */
  factor: number;
}

const rigidities = table({ 'kn*m2': 1e9, 'n*mm2': 1, 'lb*in2': POUND * INCH ** 2 });

export const quantities: Record<
  Quantity,
  { units: ReadonlyMap<string, number>; metric: Shown; us: Shown; like: Record<UnitSystem, string> }
> = {
  length: {
    units: lengths,
    metric: { unit: 'mm', factor: 1 },
    us: { unit: 'in', factor: INCH },
    like: { metric: '2400 or 2.4 m', us: `7' 10 1/2" or 94.5` },
  },
  size: {
    units: lengths,
    metric: { unit: 'mm', factor: 1 },
    us: { unit: 'in', factor: INCH },
    like: { metric: '38 or 1 1/2 in', us: '1 1/2 or 38 mm' },
  },
  force: {
    units: forces,
    metric: { unit: 'N', factor: 1 },
    us: { unit: 'lb', factor: POUND },
    like: { metric: '900, 1.2 kN or 100 kg', us: '200 or 1.2 kip' },
  },
  lineLoad: {
    units: perLength,
    metric: { unit: 'N/mm', factor: 1 },
    us: { unit: 'lb/ft', factor: POUND / (12 * INCH) },
    like: { metric: '0.9 or 0.9 kN/m', us: '50 or 50 plf' },
  },
  flow: {
    units: perLength,
    metric: { unit: 'N/mm', factor: 1 },
    us: { unit: 'lb/in', factor: POUND / INCH },
    like: { metric: '12 or 12 kN/m', us: '70 or 70 lb/in' },
  },
  moment: {
    units: moments,
    metric: { unit: 'N·m', factor: 1000 },
    us: { unit: 'lb·ft', factor: POUND * 12 * INCH },
    like: { metric: '200 or 0.2 kNm', us: '150 lb-ft' },
  },
  stress: {
    units: stresses,
    metric: { unit: 'MPa', factor: 1 },
    us: { unit: 'psi', factor: POUND / INCH ** 2 },
    like: { metric: '0.8 or 0.8 N/mm²', us: '115 or 0.8 MPa' },
  },
  stiffness: {
    units: perLength,
    metric: { unit: 'N/mm', factor: 1 },
    us: { unit: 'lb/in', factor: POUND / INCH },
    like: { metric: '800 or 0.8 kN/mm', us: '4600 or 800 N/mm' },
  },
  density: {
    units: densities,
    metric: { unit: 'kg/m³', factor: 1 },
    us: { unit: 'lb/ft³', factor: POUND_MASS_PER_CUBIC_FOOT },
    like: { metric: '420', us: '26' },
  },
  mass: {
    units: masses,
    metric: { unit: 'kg/m', factor: 1 },
    us: { unit: 'lb/ft', factor: 0.45359237 / 0.3048 },
    like: { metric: '7.4', us: '5' },
  },
  rigidity: {
    units: rigidities,
    metric: { unit: 'kN·m²', factor: 1e9 },
    us: { unit: 'lb·in²', factor: POUND * INCH ** 2 },
    like: { metric: '82', us: '28000000' },
  },
};
