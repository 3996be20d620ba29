/** A time-of-flight measurement of the ion mobility, as a run. */
import type { Case } from '../../src/case.ts';
import { simulateNow } from '../../src/simulate.ts';
import { caseOf, LOSCHMIDT, PER_TORR } from './gas-gap.ts';

/** A pulse of 1000 Td, longer than electrons need to cross 2 cm, makes ions in front of the anode; they then drift in the field of interest. */
const PULSE_TD = 1000;
const PULSE_SECONDS = 1e-7;

/** When half of the ions have arrived: the current falls to half of what it was on the way [s]. */
function arrival(spacing: number, td: number, constantMobility: number | null): number {
  const voltage = (reduced: number): number => reduced * 1e-21 * PER_TORR * spacing * 1e-2;
  const slow = (spacing * 1e-2) / (1e-4 * LOSCHMIDT * td * 1e-21);
  const settings = caseOf({
    gas: 'argon',
    torr: 1,
    spacing,
    // too small for the ions' own electrons to matter
    ionYield: 1e-9,
    electrons: 1e-6,
    supply: '{ voltage: { table: { file: bias.csv, time: t, voltage: v } }, series_resistance: 0 ohm }',
    bias: [
      [0, voltage(PULSE_TD)],
      [PULSE_SECONDS, voltage(PULSE_TD)],
      [1.5 * PULSE_SECONDS, voltage(td)],
    ],
    until: 3 * slow,
    numerics: '{ tolerance: 1e-4 }',
  });
  const trace: (readonly [number, number])[] = [];
  simulateNow(constantMobility === null ? settings : withMobility(settings, constantMobility), {
    snapshot: (s) => trace.push([s.time, s.conductionCurrent]),
  });
  const start = trace.findIndex(([t]) => t > 0.2 * slow);
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

/** K0 [cm²/(V s)] of Ar+ in argon at td [Td] from the difference of the arrival times over gaps of 1 and 2 cm at the same field, so that neither where the
 *  ions were made nor the pulse enters.
 *  @param constantMobility a mobility to put in, in place of the gas's own */
export function ionMobilityInTime(td: number, constantMobility: number | null = null): number {
  const drift = 0.01 / (arrival(2, td, constantMobility) - arrival(1, td, constantMobility));
  return drift / (td * 1e-21) / LOSCHMIDT / 1e-4;
}
