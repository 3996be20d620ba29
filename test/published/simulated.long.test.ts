/** Published numbers against runs of the program, the longer ones: both ends of the yields, long gaps, and the known limits of the model, pinned so that what the README says of them stays true.
 *
 *  Sources and status as in simulated.test.ts. */
import { describe, expect, it } from 'vitest';
import { printTable } from '../help/table.ts';
import { breakdownInTime, type GasName, runOf, simulatedMinimum } from './gas-gap.ts';

const relative = (a: number, b: number): number => Math.abs(a / b - 1);

/** A, B [1/(cm Torr), V/(cm Torr)] of Raizer, Gas Discharge Physics, 1991, Table 4.1 (argon, nitrogen from memory, H; air second-hand), for the place where a minimum is to be sought. */
const constants: Readonly<Record<GasName, readonly [number, number]>> = { argon: [12, 180], nitrogen: [12, 342], air: [15, 365] };

function formulaMinimum(gas: GasName, ionYield: number): { readonly voltage: number; readonly pd: number } {
  const [A, B] = constants[gas];
  const L = Math.log1p(1 / ionYield);
  return { voltage: (Math.E * B * L) / A, pd: (Math.E * L) / A };
}

function minimumNear(gas: GasName, ionYield: number): ReturnType<typeof simulatedMinimum> {
  const { voltage, pd } = formulaMinimum(gas, ionYield);
  return simulatedMinimum(
    gas,
    ionYield,
    [0.62, 0.8, 1, 1.25, 1.55].map((f) => Number((f * pd).toFixed(4))),
    voltage,
    3e-3,
  );
}

describe('minima of breakdown curves, simulated in time', () => {
  // Handbook minima: Naidu and Kamaraju (argon 137, nitrogen 251, from memory, H; air 327, second-hand), Kuffel et al. 2000 (air 352, nitrogen 240, from memory, M), von Engel 1965 (argon on
  // iron 265, nitrogen on iron 275, air on iron 330, from memory, M). Yields of technical surfaces, 1e-3 to 1e-1: handbooks (from memory, M). The tolerance is that spread: it must explain every handbook.
  it.each([
    ['argon', [137, 265]],
    ['nitrogen', [240, 251, 275]],
    ['air', [327, 330, 352]],
  ] as const)('in %s span every handbook’s voltage as the yield goes from 0.1 to 0.001', (gas, published) => {
    const low = minimumNear(gas, 0.1).voltage;
    const high = minimumNear(gas, 1e-3).voltage;
    printTable(`minimum in ${gas} [V]`, ['yield 0.1', ...published.map(() => 'handbook'), 'yield 0.001'], [[low, ...published, high]]);
    for (const v of published) {
      expect(v).toBeGreaterThan(low);
      expect(v).toBeLessThan(high);
    }
  });

  // Exact algebra of the Townsend criterion (computed): nitrogen 358 V at 1.045 Torr cm with A 12, B 342 and a yield of 0.01. 1 and 3 %: bisection to 0.3 %, a flat minimum, diffusion.
  it('in nitrogen with a yield of 0.01 is that of the formula, 358 V at 1.045 Torr cm', () => {
    const found = minimumNear('nitrogen', 0.01);
    expect(relative(found.voltage, 358)).toBeLessThan(0.01);
    expect(relative(found.pd, 1.045)).toBeLessThan(0.03);
  });
});

describe('long and dense gaps, simulated in time', () => {
  // Uniform-field formula for air at 20 °C, V = 24.22 x + 6.08 √x kV, x = pd/(760 Torr cm) (second-hand). 12 %: α and η known to 20 to 30 %, three-body attachment and detachment left out.
  it('air from 3 to 76 Torr cm breaks down within 12 % of the uniform-field formula', () => {
    const rows = [3, 10, 30, 76].map((pd) => {
      const x = pd / 760;
      const published = 24220 * x + 6080 * Math.sqrt(x);
      const found = breakdownInTime({ gas: 'air', torr: pd, ionYield: 0.01 }, 0.93 * published, 3e-3, '{ cells: 100 }');
      return [pd, published, found, found / published - 1] as const;
    });
    printTable('air, 1 cm', ['pd [Torr cm]', 'formula [V]', 'run [V]', 'difference'], rows);
    for (const [pd, , , difference] of rows) expect(Math.abs(difference), `${pd} Torr cm`).toBeLessThan(0.12);
  });

  // Raju, Gaseous Electronics (chapter abstract read): nitrogen, 1 cm at 1 atm, about 30.4 kV. DeBitetto and Fisher 1956 (read): yield about 1e-3. 5 %: a factor of two in the yield moves V by 1.5 %,
  // α known to 20 % by 3 %.
  it('nitrogen, 1 cm at 1 atm, breaks down within 5 % of 30.4 kV with the measured yield of 1e-3', () => {
    const found = breakdownInTime({ gas: 'nitrogen', torr: 760, ionYield: 1e-3 }, 29_000, 3e-3, '{ cells: 100 }');
    expect(relative(found, 30_400)).toBeLessThan(0.05);
  });
});

/** run of a step over the breakdown voltage that theory gives */
function stepOver(gas: GasName, torr: number, ionYield: number, overvoltage: number): ReturnType<typeof runOf>['outcome'] {
  const gap = { gas, torr, ionYield, seed: 1e-12 };
  const supply = (volts: number): string => `{ voltage: { step: ${volts} V }, series_resistance: 100 kohm }`;
  const threshold = runOf({ ...gap, supply: supply(1), until: 1e-9 }).outcome.theory.static_breakdown_voltage_V ?? Number.NaN;
  return runOf({ ...gap, supply: supply((1 + overvoltage) * threshold), until: 20e-3 }).outcome;
}

describe('lags of one gas against another', () => {
  // Kachickas and Fisher, Phys. Rev. 88, 878, 1952 and 91, 775, 1953 (from memory, L): at equal overvoltage nitrogen is slower than air and argon slower still. Plausibility only: no number.
  it('at 5 % overvoltage and equal yield: argon is slower than nitrogen, nitrogen slower than air', () => {
    const [argon, nitrogen, air] = (['argon', 'nitrogen', 'air'] as const).map(
      (gas) => stepOver(gas, 3, 0.02, 0.05).onset.formative_lag_s ?? Number.NaN,
    );
    expect(argon).toBeGreaterThan(nitrogen);
    expect(nitrogen).toBeGreaterThan(air);
  });
});

describe('known limits of the model, as the README states them', () => {
  // Fisher and Bederson, Phys. Rev. 81, 109, 1951 (from memory, M): air, 1 cm, 200 to 760 mm Hg: about 1 µs at 2 % overvoltage. Photons feed back within an electron transit;
  // the model has only ions, and its lag is 100 to 1000 times too long. The unsafe side for a pulse.
  it.each([200, 760])(
    'in air at %d Torr and 1 cm the lag at an overvoltage of 0.02 is a hundred to a thousand times the measured microsecond',
    (torr) => {
      const lag = stepOver('air', torr, 0.01, 0.02).onset.formative_lag_s ?? Number.NaN;
      expect(lag).toBeGreaterThan(100e-6);
      expect(lag).toBeLessThan(1000e-6);
    },
  );

  /** lowest glow voltage [V] over resistances, and its j/p² [µA/(cm² Torr²)] */
  function normalGlow(
    gas: GasName,
    torr: number,
    ionYield: number,
    volts: number,
  ): { readonly voltage: number; readonly reducedCurrent: number } {
    const runs = [3e6, 1e6, 5e5, 3e5, 1e5].map((ohms) => {
      const { outcome } = runOf({
        gas,
        torr,
        area: 10,
        ionYield,
        seed: 1e-10,
        supply: `{ voltage: { step: ${volts} V }, series_resistance: ${ohms} ohm }`,
        until: 20e-3,
      });
      expect(outcome.verdict.regime).toBe('glow');
      return { voltage: outcome.final.gap_voltage_V, reducedCurrent: (outcome.final.current_A / 10 / torr ** 2) * 1e6 };
    });
    return runs.reduce((a, b) => (b.voltage < a.voltage ? b : a));
  }

  // Normal current density in argon on iron and nickel, 160 µA/(cm² Torr²): von Engel 1965, Raizer 1991 (from memory, M). A local α underrates ionisation in the cathode fall.
  it('the normal current density in argon is ten to a hundred times below the handbooks’ 160 µA/(cm² Torr²)', () => {
    const { reducedCurrent } = normalGlow('argon', 3, 0.07, 400);
    expect(reducedCurrent).toBeGreaterThan(160 / 100);
    expect(reducedCurrent).toBeLessThan(160 / 10);
  });

  // Normal cathode fall in nitrogen, nickel 197, copper 208, iron 215 V: Cobine 1941, von Engel 1965, Raizer 1991 (from memory, M). With the net yield of breakdown, 0.03, it comes out too high.
  it('the glow voltage in nitrogen is 1.5 to 2 times the normal cathode fall', () => {
    const { voltage } = normalGlow('nitrogen', 2, 0.03, 900);
    expect(voltage).toBeGreaterThan(1.5 * 215);
    expect(voltage).toBeLessThan(2 * 197);
  });
});
