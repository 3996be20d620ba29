/** How handbooks' minima of the breakdown curve are compared: each file of a source gives V and pd, the rest is the same for all. */
import { minima } from '../help/measured.ts';
import { type Band, type Check, type PublishedStatus, spread, within } from './check.ts';

/** V at pd [V, Torr cm] of a gas, and the cathode where it is stated. */
export interface PublishedMinimum {
  readonly gas: string;
  readonly voltage: number;
  readonly pd: number;
  readonly status: PublishedStatus;
  readonly cathode?: string;
}

/** Range of V/pd [V/(cm Torr)] over the handbooks in this folder. In other molecular gases the net yield rises with E/N and moves the measured minimum: see LIMITS. */
const FIELDS: Readonly<Record<string, readonly [number, number]>> = {
  argon: [137 / 0.9, 265 / 1.5],
  nitrogen: [275 / 0.75, 251 / 0.67],
  helium: [155 / 4, 150 / 2.5],
  neon: [245 / 4, 244 / 3],
};

const half = ', α from swarms or constants';

/** Gases whose yield is not fitted to give a minimum: what may separate V from it. Where it was chosen with the minimum in view, which counts for nothing, the row says by how much the default differs. */
const VOLTAGES: Readonly<
  Record<string, { readonly allowed: (published: number) => Band; readonly reason: string; readonly independentOf: string | null }>
> = {
  argon: {
    allowed: (published) => spread(published, 137, 265, 0.05),
    reason: 'the handbooks’ own spread, 137 to 265 V, and 5 %: cathodes and traces of other gases differ',
    independentOf: 'any minimum: yield of dirty metal from ion beams, 0.03, α from swarms',
  },
  air: {
    allowed: (published) => spread(published, 327, 352, 0.15),
    reason:
      'handbooks give 327 to 352 V; beyond that the 15 % that the data state for V_s, α known to 20 % and the yield to a factor of two',
    independentOf: `any minimum: yield 0.01, the handbooks’ default${half}`,
  },
  helium: {
    allowed: () => within(0.3),
    reason:
      'α known to 20 %, which moves V as much; a cathode in use yields 1.5 to 2 times less than the clean tungsten taken here, 20 %: together 30 %',
    independentOf: `any minimum: yield of clean tungsten from ion beams, 0.29${half}`,
  },
  oxygen: {
    allowed: () => within(0.36),
    reason: 'the data state 30 % at a known yield; a yield known to a factor of three, ln(1 + 1/γ) = 5.8 ± 1.1, adds 19 %: together 36 %',
    independentOf: null, // the yield was chosen with this minimum in view, larger than what it needs
  },
  'carbon dioxide': {
    allowed: () => within(0.31),
    reason: 'the data state 25 % at a known yield; a yield known to a factor of three, ln(1 + 1/γ) = 5.8 ± 1.1, adds 19 %: together 31 %',
    independentOf: null, // the yield was chosen with this minimum in view, larger than what it needs
  },
  'water vapour': {
    allowed: () => within(0.48),
    reason: 'the data state 30 % at a known yield; a yield known to a factor of ten, ln(1 + 1/γ) = 5.8 ± 2.2, adds 37 %: together 48 %',
    independentOf: null, // the yield was chosen with this minimum in view, larger than what it needs
  },
  'sulphur hexafluoride': {
    allowed: () => within(0.48),
    reason: 'the data state 30 % at a known yield; a yield known to a factor of ten, ln(1 + 1/γ) = 6.2 ± 2.3, adds 37 %: together 48 %',
    independentOf: null, // the yield was chosen with this minimum in view, larger than what it needs
  },
};

/** Where a constant yield leaves the pd of the minimum, as a multiple of the published one: the notes of each gas say so. */
const LIMITS: Readonly<Record<string, Band>> = {
  air: { low: 1.4, high: 1.6 },
  hydrogen: { low: 1.5, high: 2 },
  oxygen: { low: 1.2, high: 1.7 },
  'carbon dioxide': { low: 1.2, high: 1.7 },
  'water vapour': { low: 3, high: 4 },
  'sulphur hexafluoride': { low: 1.5, high: 2.2 },
};

/** The rows of one published minimum: its voltage, its V/pd, or its pd as a known limit, whichever say something. */
export function minimumRows({ gas, voltage, pd, status, cathode }: PublishedMinimum): Check[] {
  const name = `minimum in ${gas}${cathode === undefined ? '' : ` on ${cathode}`}, ${voltage} V at ${pd} Torr cm:`;
  const rows: Check[] = [];
  const add = (what: string, rest: Omit<Check, 'check' | 'status' | 'simulated'>): void => {
    rows.push({ check: `${name} ${what}`, status, simulated: true, ...rest });
  };
  if (Object.hasOwn(VOLTAGES, gas)) {
    const { allowed, ...rest } = VOLTAGES[gas];
    add('V', { ...rest, published: voltage, unit: 'V', allowed: allowed(voltage), compute: () => minima[gas]().voltage });
  }
  if (Object.hasOwn(FIELDS, gas)) {
    const published = Number((voltage / pd).toPrecision(4));
    add('V/pd', {
      published,
      unit: 'V/(cm Torr)',
      allowed: spread(published, ...FIELDS[gas], 0.15),
      reason: 'the handbooks’ range and 15 % beyond: V is 1 % up at 15 % off in pd, so nobody places a minimum better',
      independentOf: 'any breakdown criterion; V/pd at the minimum (Stoletow) does not depend on the yield',
      compute: () => minima[gas]().reducedField,
    });
  }
  if (Object.hasOwn(LIMITS, gas))
    add('pd', {
      published: pd,
      unit: 'Torr cm',
      allowed: LIMITS[gas],
      knownLimit: true,
      reason:
        'the net yield of molecular gases rises with E/N, here it is constant: the minimum stays at too large a pd, as the notes of the gas say',
      independentOf: 'this pd',
      compute: () => minima[gas]().pd,
    });
  return rows;
}
