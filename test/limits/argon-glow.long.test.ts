/** The steady discharge in argon, whose coefficients all depend on the field, against the collocation oracle with the same fits written out here.
 *
 *  α/N and the drift velocity of Ar⁺: Phelps & Petrović, Plasma Sources Sci. Technol. 8, R21, 1999 (from memory H); the electrons' mobility and energy are
 *  those of the built-in gas, which says where they come from. */
import { describe, expect, it } from 'vitest';
import { simulateNow } from '../../src/simulate.ts';
import { builtInCase } from '../help/built-in.ts';
import { stepTo } from '../help/plain-gap.ts';
import { printTable } from '../help/table.ts';
import { BOLTZMANN, ELEMENTARY_CHARGE } from '../oracles/open-case.ts';
import { type SteadyGap, voltageCurrentCurve } from '../oracles/steady-gap.ts';

const SEED = 1e-12;
const CURRENTS = [1e-7, 1e-5, 1e-4, 1e-3, 5e-3, 2e-2];

function argon(torr: number, spacing: number, area: number, ionYield: number): SteadyGap {
  const N = (torr * 101325) / 760 / (BOLTZMANN * 293.15);
  const townsend = (field: number): number => field / N / 1e-21;
  return {
    spacing,
    area,
    ionYield,
    seedCurrent: SEED,
    alpha: (field) => {
      const x = townsend(field);
      if (x === 0) return 0;
      const fit =
        1.1e-22 * Math.exp(-72 / x) + 5.5e-21 * Math.exp(-187 / x) + 3.2e-20 * Math.exp(-700 / x) - 1.5e-20 * Math.exp(-10000 / x);
      return N * Math.max(0, fit);
    },
    electronMobility: (field) => (7.8e23 / N) * (Math.max(3, townsend(field)) / 100) ** -0.121,
    ionMobility: (field) => 4e21 / N / (1 + (0.007 * townsend(field)) ** 1.5) ** 0.33,
    electronEnergy: 6,
    ionEnergy: (BOLTZMANN * 293.15) / ELEMENTARY_CHARGE,
  };
}

describe('the steady voltage–current curve of argon', () => {
  for (const [torr, spacing] of [
    [2, 0.01],
    [0.5, 0.01],
    [5, 0.005],
  ]) {
    it(`is that of the steady equations within 0.5 % from dark to abnormal glow, ${torr} Torr over ${spacing} m`, () => {
      const gap = argon(torr, spacing, 1e-3, 0.07);
      const guess = voltageCurrentCurve(gap, CURRENTS, { accuracy: 1e-4 });
      const outcomes = CURRENTS.map((current, i) => {
        const resistance = (5 * guess[i].voltage) / current;
        return simulateNow(
          builtInCase(
            { gas: 'argon', torr, spacing, area: 1e-3, ionYield: 0.07 },
            {
              seed: { cathodeCurrent: SEED },
              supply: { programme: stepTo(6 * guess[i].voltage), seriesResistance: resistance },
              observe: { until: Math.max(0.05, 1e-10 * resistance) },
            },
          ),
        );
      });
      const exact = voltageCurrentCurve(
        gap,
        outcomes.map((o) => o.final.current_A),
        { accuracy: 1e-6 },
      );
      const rows = outcomes.map((o, i) => [
        o.final.current_A,
        o.final.gap_voltage_V,
        o.final.gap_voltage_V / exact[i].voltage - 1,
        o.final.cathode_field_V_per_m / exact[i].cathodeField - 1,
      ]);
      printTable(`V(j) of argon, ${torr} Torr over ${spacing} m`, ['current A', 'V', 'error', 'error of cathode field'], rows);
      for (const o of outcomes) expect(o.final.stop).toBe('steady');
      for (const row of rows) {
        expect(Math.abs(row[2]), `V at ${row[0]} A`).toBeLessThan(5e-3);
        expect(Math.abs(row[3]), `cathode field at ${row[0]} A`).toBeLessThan(5e-3);
      }
    });
  }
});
