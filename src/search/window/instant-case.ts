import type { Case } from '../../case.ts';
import type { Programme } from '../../supply/settings.ts';
import type { Surface } from '../../surfaces/surface.ts';
import { sameYield } from '../../surfaces/yield-law.ts';
import { BOLTZMANN } from '../../units/constants.ts';
import { largestVoltage } from '../scaled.ts';

/** Which end of the published spread of the electrodes' ion yields is taken. */
export type YieldEnd = 'low' | 'typical' | 'high';

/** Which wall is the cathode: 1 the left one (positive voltage), −1 the right one. */
export type Polarity = 1 | -1;

/** The same gap in other surroundings.
 *
 *  Coefficients are held against N and E/N, so that only N = p/(kT) changes: gaps of equal density answer alike at any temperature. D/μ of the ions too
 *  stays what it is in the case (kT/e at the case's temperature where nobody gave it); taking it at the instant's temperature instead would move a
 *  breakdown voltage by less than 1e-4. Title and hash still name the original.
 *  @param pressure  [Pa]   @param temperature  [K] */
export function atSurroundings(settings: Case, pressure: number, temperature: number): Case {
  return { ...settings, gas: { ...settings.gas, pressure, temperature, density: pressure / (BOLTZMANN * temperature) } };
}

/** The same gap at another density, at the case's own temperature.
 *  @param density  [1/m³] */
export function atDensity(settings: Case, density: number): Case {
  const { temperature } = settings.gas;
  const there = atSurroundings(settings, density * BOLTZMANN * temperature, temperature);
  return { ...there, gas: { ...there.gas, density } };
}

/** The same gap with the ion yields of both electrodes at one end of their spread. */
export function withYields(settings: Case, end: YieldEnd): Case {
  if (end === 'typical') return settings;
  const { left, right } = settings.electrodes;
  const changed = (surface: Surface): Surface => ({ ...surface, ionYield: { ...surface.ionYield, typical: surface.ionYield[end] } });
  return { ...settings, electrodes: { left: changed(left), right: left === right ? changed(left) : changed(right) } };
}

/** Whether the published yields of any electrode are a range and not one number. */
export function yieldsSpread({ electrodes: { left, right } }: Case): boolean {
  return [left, right].some(({ ionYield: { low, high } }) => high > low * 1.001);
}

/** Whether it makes no difference which wall is the cathode. */
export function isSymmetric({ electrodes: { left, right } }: Case): boolean {
  const [one, other] = [left.ionYield, right.ionYield];
  return sameYield(one, other) && one.low === other.low && one.high === other.high;
}

/** A path through the gas as a plane gap of its own, energised at one polarity, for runs that ask only whether it breaks down.
 *
 *  The programme keeps its shape and may change its sign; a supply that never leaves 0 V becomes a sudden step. A trip is left out: it acts after the
 *  answer and would only hide it. Where the data of ionisation end is left to the window to judge.
 *  @param path  [m] between the electrodes */
export function alongPath(settings: Case, path: number, polarity: Polarity): Case {
  const { gap, gas, supply } = settings;
  const { coefficients } = gas;
  return {
    ...settings,
    gap: { ...gap, spacing: path, longestPath: path },
    gas: { ...gas, coefficients: { ...coefficients, ionisation: { ...coefficients.ionisation, range: null } } },
    supply: { ...supply, ...driven(supply.programme, supply.initialGapVoltage, polarity, largestVoltage(supply)), trip: null },
    observe: { ...settings.observe, currents: [] },
  };
}

function driven(
  programme: Programme,
  initialGapVoltage: number,
  polarity: Polarity,
  largest: number,
): { readonly programme: Programme; readonly initialGapVoltage: number } {
  if (!(largest > 0)) return { programme: { kind: 'step', voltage: polarity, riseTime: 0 }, initialGapVoltage: 0 };
  const extreme = Math.abs(initialGapVoltage) === largest ? initialGapVoltage : extremeOf(programme);
  if (Math.sign(extreme) === polarity) return { programme, initialGapVoltage };
  return { programme: mirrored(programme), initialGapVoltage: -initialGapVoltage };
}

/** the voltage of largest magnitude, with its sign */
function extremeOf(programme: Programme): number {
  switch (programme.kind) {
    case 'step':
      return programme.voltage;
    case 'ramp':
      return Math.abs(programme.from) > Math.abs(programme.to) ? programme.from : programme.to;
    case 'table':
      return programme.voltages.reduce((extreme, v) => (Math.abs(v) > Math.abs(extreme) ? v : extreme), 0);
  }
}

function mirrored(programme: Programme): Programme {
  switch (programme.kind) {
    case 'step':
      return { ...programme, voltage: -programme.voltage };
    case 'ramp':
      return { ...programme, from: -programme.from, to: -programme.to };
    case 'table':
      return { ...programme, voltages: programme.voltages.map((v) => -v) };
  }
}

/** When the programme of a case has done all it does [s]. */
export function programmeEnds({ supply: { programme } }: Case): number {
  switch (programme.kind) {
    case 'step':
      return programme.riseTime;
    case 'ramp':
      return Math.abs(programme.to - programme.from) / programme.rate;
    case 'table':
      return Math.max(0, programme.times[programme.times.length - 1]);
  }
}
