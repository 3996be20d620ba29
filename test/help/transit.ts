/** Time-of-flight measurements of mobilities, as runs. */
import type { Case } from '../../src/case.ts';
import { simulateNow } from '../../src/simulate.ts';
import { caseOf, type GasName, LOSCHMIDT, PER_TORR } from './gas-gap.ts';

/** A pulse of 1000 Td, longer than electrons need to cross 2 cm, makes ions in front of the anode; they then drift in the field of interest.
 *  In light gases, whose electrons and ions are fast, it is shorter, and the gas denser, for the ions to be made close to the anode. */
const PULSE_TD = 1000;
const HEAVY = { torr: 1, pulse: 1e-7 };
const LIGHT = { torr: 4, pulse: 2e-8 };

interface IonSwarm {
  readonly gas: GasName;
  readonly td: number;
  /** [cm²/(V s)], within a factor of two; sets how long a run lasts, nothing else */
  readonly roughly: number;
  /** K0 to put in, in place of the gas's own */
  readonly constantMobility: number | null;
}

/** When half of the ions have arrived: the current falls to half of what it was on the way [s]. */
function ionArrival(spacing: number, { gas, td, roughly, constantMobility }: IonSwarm): number {
  const { torr, pulse } = roughly > 3 ? LIGHT : HEAVY;
  const voltage = (reduced: number): number => reduced * 1e-21 * torr * PER_TORR * spacing * 1e-2;
  const slow = (spacing * 1e-2) / (roughly * 1e-4 * LOSCHMIDT * td * 1e-21);
  const settings = caseOf({
    gas,
    torr,
    spacing,
    // too small for the ions' own electrons to matter
    ionYield: 1e-9,
    electrons: 1e-6,
    supply: '{ voltage: { table: { file: bias.csv, time: t, voltage: v } }, series_resistance: 0 ohm }',
    bias: [
      [0, voltage(PULSE_TD)],
      [pulse, voltage(PULSE_TD)],
      [1.5 * pulse, voltage(td)],
    ],
    until: 3 * slow,
    numerics: '{ tolerance: 1e-4 }',
  });
  const trace: Trace = [];
  simulateNow(constantMobility === null ? settings : withMobility(settings, constantMobility), {
    snapshot: (s) => trace.push([s.time, s.conductionCurrent]),
  });
  return halfFallen(trace, 0.2 * slow);
}

type Trace = (readonly [time: number, current: number])[];

/** when the current has fallen to half of what it was at `from` */
function halfFallen(trace: Trace, from: number): number {
  const start = trace.findIndex(([t]) => t > from);
  const half = trace[start][1] / 2;
  const after = trace.findIndex(([, current], i) => i > start && current < half);
  const [t1, i1] = trace[after];
  const [t0, i0] = trace[after - 1];
  return t0 + ((t1 - t0) * (i0 - half)) / (i0 - i1);
}

function withMobility(settings: Case, K0: number): Case {
  const { gas } = settings;
  const form = { kind: 'constant', value: K0 * 1e-4 * LOSCHMIDT } as const;
  return { ...settings, gas: { ...gas, coefficients: { ...gas.coefficients, ionMobility: { ...gas.coefficients.ionMobility, form } } } };
}

/** K0 [cm²/(V s)] of the positive ion of a gas at td [Td] from the difference of the arrival times over gaps of 1 and 2 cm at the same field, so that neither
 *  where the ions were made nor the pulse enters.
 *  @param constantMobility a mobility to put in, in place of the gas's own */
export function ionMobilityInTime(td: number, constantMobility: number | null = null, gas: GasName = 'argon', roughly = 1): number {
  const swarm = { gas, td, roughly, constantMobility };
  const drift = 0.01 / (ionArrival(2, swarm) - ionArrival(1, swarm));
  return drift / (td * 1e-21) / LOSCHMIDT / 1e-4;
}

/** Dense enough for an electron swarm to stay narrow against the gap: voltage over D/μ is 100 and more. */
const ELECTRON_TORR = 300;

/** When half of the electrons released at the cathode have arrived [s]. */
function electronArrival(spacing: number, gas: GasName, td: number, roughly: number): number {
  const field = td * 1e-21 * ELECTRON_TORR * PER_TORR;
  const transit = (spacing * 1e-2) / (((roughly * 1e-4) / ELECTRON_TORR) * field);
  const trace: Trace = [];
  simulateNow(
    caseOf({
      gas,
      torr: ELECTRON_TORR,
      spacing,
      ionYield: 1e-9,
      electrons: 1e-6,
      supply: `{ voltage: { step: ${field * spacing * 1e-2} V }, series_resistance: 0 ohm }`,
      until: 4 * transit,
      numerics: '{ tolerance: 1e-4 }',
    }),
    { snapshot: (s) => trace.push([s.time, s.conductionCurrent]) },
  );
  return halfFallen(trace, 0.2 * transit);
}

/** μp [cm² Torr/(V s)] at 20 °C of electrons at td [Td], timed over the difference between gaps of 1 and 2 cm.
 *  @param roughly  the answer within a factor of two */
export function electronMobilityInTime(gas: GasName, td: number, roughly: number): number {
  const drift = 0.01 / (electronArrival(2, gas, td, roughly) - electronArrival(1, gas, td, roughly));
  return (drift / (td * 1e-21 * PER_TORR)) * 1e4;
}
