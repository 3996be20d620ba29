/** What a laboratory would measure, as runs in the built-in gases; each measurement is made once. */
import { breakdownInTime, type GasName, runOf, simulatedMinimum } from './gas-gap.ts';

type Minimum = ReturnType<typeof simulatedMinimum>;

function once<T>(measure: () => T): () => T {
  let known: { readonly value: T } | null = null;
  return () => {
    known ??= { value: measure() };
    return known.value;
  };
}

/** The simulated Paschen minima, with the yield and the places [Torr cm] at which it is sought.
 *
 *  Argon 0.03: Ar+ of 30 to 100 eV on dirty metal, Phelps and Petrović 1999 (computed from the fit; from memory, H). Nitrogen, neon, hydrogen: the typical yields of the data, fitted to one handbook's voltage, so that
 *  only the field of their minima is a check. Air 0.01: default of handbooks for technical surfaces (second-hand). Helium 0.29: He+ on clean tungsten, Hagstrum 1954 (from memory, H). Oxygen, carbon dioxide, water vapour, sulphur
 *  hexafluoride: the typical yields of the data, which no minimum was fitted to. */
export const minima: Readonly<Record<string, () => Minimum>> = {
  argon: once(() => simulatedMinimum('argon', 0.03, [0.6, 0.8, 1, 1.25], 165, 4e-3)),
  nitrogen: once(() => simulatedMinimum('nitrogen', 0.03, [0.6, 0.75, 0.95, 1.2], 290, 4e-3)),
  air: once(() => simulatedMinimum('air', 0.01, [0.6, 0.75, 0.95, 1.2], 330, 4e-3)),
  helium: once(() => simulatedMinimum('helium', 0.29, [1.9, 2.4, 3, 3.8], 128, 4e-3)),
  neon: once(() => simulatedMinimum('neon', 0.025, [2.4, 3, 3.8, 4.8], 245, 4e-3)),
  hydrogen: once(() => simulatedMinimum('hydrogen', 0.03, [1.3, 1.7, 2.2, 2.8], 280, 4e-3)),
  oxygen: once(() => simulatedMinimum('oxygen', 3e-3, [0.7, 0.9, 1.15, 1.5], 340, 4e-3)),
  'carbon dioxide': once(() => simulatedMinimum('carbon dioxide', 3e-3, [0.5, 0.65, 0.85, 1.1], 380, 4e-3)),
  'water vapour': once(() => simulatedMinimum('water vapour', 3e-3, [1.3, 1.7, 2.2, 2.8], 360, 4e-3)),
  'sulphur hexafluoride': once(() => simulatedMinimum('sulphur hexafluoride', 2e-3, [0.3, 0.4, 0.5, 0.65], 370, 4e-3)),
};

/** nitrogen with a yield of 0.01, for the exact algebra of its constants */
export const nitrogenWith1e2: () => Minimum = once(() => simulatedMinimum('nitrogen', 0.01, [0.65, 0.85, 1.05, 1.3, 1.6], 358, 3e-3));

/** The breakdown voltage of air in 1 cm at a pressure [Torr], with the handbooks' default yield. */
export function airBreakdown(torr: number, guess: number): number {
  return breakdownInTime({ gas: 'air', torr, ionYield: 0.01 }, guess, 3e-3, torr > 20 ? '{ cells: 100 }' : undefined);
}

/** The formative lag of a step over the breakdown voltage that theory gives for the gap [s]. */
export function lagOf(gas: GasName, torr: number, ionYield: number, overvoltage: number, resistance = 1e4): number {
  const gap = { gas, torr, ionYield, seed: 1e-12 };
  const step = (volts: number): string => `{ voltage: { step: ${volts} V }, series_resistance: ${resistance} ohm }`;
  const threshold = runOf({ ...gap, supply: step(1), until: 1e-9 }).outcome.theory.static_breakdown_voltage_V ?? Number.NaN;
  return runOf({ ...gap, supply: step((1 + overvoltage) * threshold), until: 20e-3 }).outcome.onset.formative_lag_s ?? Number.NaN;
}

/** The lowest voltage of a glow over series resistances [V], with its j/p² [µA/(cm² Torr²)]; the model's normal glow. */
export interface Glow {
  readonly voltage: number;
  readonly reducedCurrent: number;
  /** whether the voltage falls first and then rises as the current grows */
  readonly inside: boolean;
}

const glow = (gas: GasName, torr: number, ionYield: number, volts: number, ohms: readonly number[]): (() => Glow) =>
  once(() => {
    const runs = ohms.map((R) => {
      const { outcome } = runOf({
        gas,
        torr,
        area: 10,
        ionYield,
        seed: 1e-10,
        supply: `{ voltage: { step: ${volts} V }, series_resistance: ${R} ohm }`,
        until: 20e-3,
      });
      if (outcome.verdict.regime !== 'glow') throw new Error(`${gas} behind ${R} ohm: ${outcome.verdict.regime}, no glow`);
      if (outcome.final.stop !== 'steady') throw new Error(`${gas} behind ${R} ohm is not steady`);
      return { voltage: outcome.final.gap_voltage_V, reducedCurrent: (outcome.final.current_A / 10 / torr ** 2) * 1e6 };
    });
    const lowest = runs.reduce((a, b) => (b.voltage < a.voltage ? b : a));
    const k = runs.indexOf(lowest);
    return { ...lowest, inside: k > 0 && k < runs.length - 1 };
  });

/** With the clean yield of argon, 0.07; in nitrogen with the net yield of breakdown, 0.03. */
export const glows: Readonly<Record<'argon' | 'nitrogen', () => Glow>> = {
  argon: glow('argon', 3, 0.07, 400, [2e6, 1e6, 5e5, 2e5, 1e5]),
  nitrogen: glow('nitrogen', 2, 0.03, 900, [3e6, 1e6, 5e5, 3e5, 1e5]),
};
