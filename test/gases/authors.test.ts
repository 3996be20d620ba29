/** α/N of one author against another's, and of all against a solution of the Boltzmann equation that contains neither. */
import { describe, expect, it } from 'vitest';
import { curveOf } from '../../src/gases/curves.ts';
import { gasData, gases } from '../../src/gases/index.ts';
import { printTable } from '../help/table.ts';
import { targets } from './cross-sections.ts';
import { criticalField } from './townsend.ts';
import { swarm } from './two-term.ts';

const alpha = (gas: string, set: string | undefined, td: number): number => {
  const data = gasData(gas, set);
  if (!data) throw new Error(`no set ${set} of ${gas}`);
  return curveOf(data.coefficients.ionisation.form).valueAt(td * 1e-21);
};

/* Largest |ln| of the ratio over the fields for which both authors claim validity (from 200 V/(cm Torr) in krypton and xenon, from 135 Td in helium: at the low end of its range a pair A, B bends too steeply). All from memory (H, M) or
 * second-hand. Expected: 25 %, as each author claims some 15 % and the pressure of textbook constants, taken at 20 °C, may mean 0 °C, 7 %. The figures are the agreement on record, which reasons and notes of the data quote: tested
 * from both sides so that they stay true. */
const pairs = [
  ['argon', 'phelps-petrovic', 'raizer', 304, 1821, 0.04],
  ['argon', 'phelps-petrovic', 'lieberman', 304, 1821, 0.04],
  ['argon', 'raizer', 'lieberman', 304, 1821, 0.04],
  ['nitrogen', 'raizer', 'lieberman', 607, 1821, 0.07],
  ['air', 'raizer', 'morrow-lowke', 400, 560, 0.2],
  ['helium', 'ward', 'lieberman', 135, 709, 0.22],
  ['neon', 'ward', 'lieberman', 330, 1130, 0.07],
  ['neon', 'ward-lieberman', 'raizer', 304, 1214, 0.07],
  ['krypton', 'ward', 'lieberman', 607, 2546, 0.11],
  ['krypton', 'ward', 'raizer', 607, 2546, 0.11],
  ['xenon', 'ward', 'lieberman', 607, 2428, 0.12],
  ['xenon', 'ward', 'raizer', 607, 2428, 0.14],
  ['hydrogen', 'lieberman', 'raizer', 455, 1821, 0.082],
] as const;

describe('α/N of one author against another’s', () => {
  it.each(pairs)('in %s: %s and %s agree from %d to %d Td within %d', (gas, a, b, from, to, tolerance) => {
    let worst = 0;
    for (let td = from; td <= to; td *= 1.01) worst = Math.max(worst, Math.abs(Math.log(alpha(gas, a, td) / alpha(gas, b, td))));
    expect(worst).toBeLessThan(tolerance);
    expect(worst).toBeGreaterThan(0.6 * tolerance);
  });

  // Raizer 3, 34 against Ward: the known conflict in helium. The notes say 2.7 times at 100 Td.
  it('in helium disagree by 2.7 times at 100 Td between Ward and Raizer', () => {
    expect(alpha('helium', 'raizer', 100) / alpha('helium', 'ward', 100)).toBeGreaterThan(2.6);
    expect(alpha('helium', 'raizer', 100) / alpha('helium', 'ward', 100)).toBeLessThan(2.8);
  });
});

/** energy [eV] beyond which hardly any electron is found at E/N [Td] */
const topOf = (gas: string, td: number): number => (['helium', 'neon', 'krypton', 'xenon'].includes(gas) ? 60 + 0.5 * td : 35 + 0.35 * td);

describe('α/N against our own solution of the Boltzmann equation, cross-sections from memory', () => {
  /* Nothing of the published α enters the solution. 25 %: two terms and equal sharing 10 to 20 %, recalled cross-sections 10 to 15 %. The default of each gas must pass; where the table holds a wider figure the notes of the gas say so. */
  const checks: readonly (readonly [keyof typeof targets, readonly number[], number])[] = [
    ['helium', [50, 100, 200, 300, 500, 700], 0.2],
    ['neon', [100, 200, 300, 500, 1000], 0.2],
    ['krypton', [300, 500, 1000, 2000], 0.25],
    ['xenon', [300, 500, 1000, 2000], 0.2],
    ['hydrogen', [200, 300, 500, 1000], 0.25],
    ['nitrogen', [700, 1000, 1500], 0.2],
    ['oxygen', [150, 200, 300, 400, 500, 1000, 2000], 0.2],
    ['carbon dioxide', [1000, 1500, 2000, 3000], 0.1],
    ['water vapour', [150, 200, 300, 500, 700, 1000, 2000], 0.16],
  ];
  it.each(checks)('in %s at %j Td within %d', (gas, fields, tolerance) => {
    const rows = fields.map((td) => {
      const computed = swarm(targets[gas], td, topOf(gas, td), 400).ionisation;
      return [td, alpha(gas, undefined, td), computed, computed / alpha(gas, undefined, td) - 1] as const;
    });
    printTable(`α/N in ${gas}`, ['Td', 'data', 'computed', 'difference'], rows);
    for (const [td, , , difference] of rows) expect(Math.abs(difference), `${td} Td`).toBeLessThan(tolerance);
  });

  // What the notes of krypton and xenon admit.
  it.each([
    ['krypton', 1.7, 1.9],
    ['xenon', 1.6, 1.8],
  ] as const)('in %s is %d to %d times the data at 100 Td, as the notes say', (gas, from, to) => {
    const ratio = swarm(targets[gas], 100, topOf(gas, 100), 400).ionisation / alpha(gas, undefined, 100);
    expect(ratio).toBeGreaterThan(from);
    expect(ratio).toBeLessThan(to);
  });

  // The conflict in helium: only one of the two can be right, and the solution says which.
  it('in helium sides with Ward, not with the constants 3, 34', () => {
    for (const td of [50, 100, 150]) {
      const computed = swarm(targets.helium, td, topOf('helium', td), 400).ionisation;
      expect(Math.abs(computed / alpha('helium', 'ward', td) - 1), `${td} Td`).toBeLessThan(0.2);
      expect(alpha('helium', 'raizer', td) / computed, `${td} Td`).toBeGreaterThan(1.8);
    }
  });

  // Lieberman and Lichtenberg, 6.5 and 190 for 50 to 130 V/(cm Torr), 152 to 395 Td (from memory, M): a published fit that did not enter the solution
  it('in oxygen agrees with the published constants within 20 % over the range of those', () => {
    for (const td of [152, 200, 300, 395]) {
      const computed = swarm(targets.oxygen, td, topOf('oxygen', td), 400).ionisation;
      expect(Math.abs(computed / alpha('oxygen', 'lieberman', td) - 1), `${td} Td`).toBeLessThan(0.2);
    }
  });
});

describe('the field at which ionisation overtakes attachment', () => {
  // Sulphur hexafluoride: 88.5 kV/(cm bar), 358 Td (Boyd and Crichton 1971, from memory, H); about 360 Td in every handbook. 2 %: measurements agree that well.
  it('is 360 Td in sulphur hexafluoride, within 2 %', () => {
    expect(Math.abs(criticalField('sulphur hexafluoride') / 360 - 1)).toBeLessThan(0.02);
  });

  // Boyd and Crichton: (α − η)/N = 0.0277 (E/N − 358 Td) from 303 to 813 Td. Compared are the fields at which the same net ionisation is reached, for V_s at large pd follows the field: 8 %, a straight line through a curve whose two
  // branches meet at 460 Td, where the net ionisation itself differs by a third.
  it('is passed in sulphur hexafluoride with the net ionisation that Boyd and Crichton have at a field within 8 %, from 420 to 800 Td', () => {
    const eta = curveOf(gases['sulphur hexafluoride'].coefficients.attachment?.form ?? { kind: 'constant', value: Number.NaN });
    let worst = 0;
    for (let td = 420; td <= 800; td += 5) {
      const net = alpha('sulphur hexafluoride', undefined, td) - eta.valueAt(td * 1e-21);
      worst = Math.max(worst, Math.abs((net / 0.0277 / 1e-21 + 358.2) / td - 1));
    }
    expect(worst).toBeLessThan(0.08);
    expect(worst).toBeGreaterThan(0.06);
  });

  // From memory (air common practice, 100 to 130 Td; oxygen M, 35 to 40 V/(cm Torr); carbon dioxide L, 80 to 90 Td; water vapour L, 43 V/(cm Torr)). 10 % beyond, as α and η at these fields are known to a factor of 1.5 and cross steeply.
  it.each([
    ['air', 100, 130],
    ['oxygen', 106, 121],
    ['carbon dioxide', 80, 90],
    ['water vapour', 125, 135],
  ])('is in %s the published one, %d to %d Td, within 10 %', (gas, from, to) => {
    expect(criticalField(gas)).toBeGreaterThan(0.9 * from);
    expect(criticalField(gas)).toBeLessThan(1.1 * to);
  });
});
