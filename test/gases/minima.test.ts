/** Breakdown minima from the data, in closed form, against published ones. Plausibility: the published values are from memory (H, M) unless said, and yields of real cathodes are known to a factor. */
import { describe, expect, it } from 'vitest';
import { gases } from '../../src/gases/index.ts';
import { yieldFor } from '../../src/surfaces/index.ts';
import { printTable } from '../help/table.ts';
import { publishedMinima } from './published-minima.ts';
import { minimum, type Point } from './townsend.ts';

/** of an unspecified metal */
const yieldOf = (gas: string): { low: number; typical: number; high: number } => {
  const row = yieldFor('metal', gas)?.ionYield;
  if (!row) throw new Error(`no yield for ${gas}`);
  return row;
};
const minimumWith = (gas: string, ionYield: number): Point => minimum(gas, undefined, () => ionYield);
const withData = Object.keys(publishedMinima);

describe('minima of the breakdown voltage', () => {
  it('are printed beside the published ones', () => {
    const rows = Object.keys(gases).map((gas) => {
      const y = yieldOf(gas);
      const { voltage, pd, td } = minimumWith(gas, y.typical);
      const published = (publishedMinima[gas] ?? []).map((m) => `${m.voltage} at ${m.pd} (${m.source})`).join(', ');
      return [gas, gases[gas].set, y.typical, Math.round(voltage), pd, Math.round(td), published || 'none found'];
    });
    printTable('minimum with the typical yield', ['gas', 'set', 'γ', 'V', 'Torr cm', 'Td', 'published'], rows);
    expect(rows).toHaveLength(12);
  });

  // The yield's spread must explain every handbook: cathodes differ by a factor, and V goes as ln(1 + 1/γ).
  it.each(withData)('in %s lie around every published voltage as the yield goes from its low to its high end', (gas) => {
    const { low, high } = yieldOf(gas);
    for (const { voltage, source } of publishedMinima[gas]) {
      expect(voltage, source).toBeGreaterThan(minimumWith(gas, high).voltage);
      expect(voltage, source).toBeLessThan(minimumWith(gas, low).voltage);
    }
  });

  // The typical yield may put the voltage low, which is safe, never high: 10 % above the highest handbook is the most that a flat minimum and rounded yields explain.
  it.each(withData)('in %s with the typical yield is not above the published voltages by more than 10 %', (gas) => {
    expect(minimumWith(gas, yieldOf(gas).typical).voltage).toBeLessThan(1.1 * Math.max(...publishedMinima[gas].map((m) => m.voltage)));
  });

  // …nor is it below the lowest by more than 30 %, which is what the data of the worst gases state as the uncertainty of V_s for a known yield.
  it.each(withData)('in %s with the typical yield is not below the published voltages by more than 30 %', (gas) => {
    expect(minimumWith(gas, yieldOf(gas).typical).voltage).toBeGreaterThan(0.7 * Math.min(...publishedMinima[gas].map((m) => m.voltage)));
  });

  // Rare gases, whose yield hardly depends on the field: E/p at the minimum, D²/4 in Ward's form whatever the yield. Handbooks of one gas differ by up to 50 %: helium 39 to 60 V/(cm Torr), neon 61 to 81, argon
  // 152 to 177. 15 % more, as a minimum is so flat (V 1 % up at 15 % off in pd) that nobody places its pd better.
  it.each(['helium', 'neon', 'argon'])('in %s lie at the published E/p, within 15 % of the handbooks’ range', (gas) => {
    const published = publishedMinima[gas].map((m) => m.voltage / m.pd);
    const { voltage, pd } = minimumWith(gas, yieldOf(gas).typical);
    expect(voltage / pd).toBeGreaterThan(0.85 * Math.min(...published));
    expect(voltage / pd).toBeLessThan(1.15 * Math.max(...published));
  });

  // In molecular gases the net yield rises with E/N (from 1e-3 at 20 to 40 V/(cm Torr) in hydrogen and nitrogen, DeBitetto and Fisher 1956, read; a few per cent at the minimum), which moves measured minima to
  // smaller pd; a constant yield leaves them further right. The notes of each gas say by how much; kept so that they stay true.
  it.each([
    ['nitrogen', 1, 1.25],
    ['air', 1.4, 1.6],
    ['hydrogen', 1.5, 2],
    ['oxygen', 1.2, 1.7],
    ['carbon dioxide', 1.2, 1.7],
    ['water vapour', 3, 4],
    ['sulphur hexafluoride', 1.5, 2.2],
  ])('in %s lie at a pd %d to %d times the published one with a constant yield', (gas, from, to) => {
    const { pd } = minimumWith(gas, yieldOf(gas).typical);
    for (const published of publishedMinima[gas]) {
      expect(pd / published.pd).toBeGreaterThan(from);
      expect(pd / published.pd).toBeLessThan(to);
    }
  });

  // exact algebra of the Townsend criterion in Ward's form: V = D² e² L/(4C), pd = e² L/C, L = ln(1 + 1/γ), γ = 0.07 (computed); in the pd of 0 °C. 0.5 %: figures given to three places.
  it.each([
    ['helium', 224, 4.58],
    ['neon', 178, 2.46],
    ['krypton', 112, 0.564],
    ['xenon', 101, 0.309],
  ])('in %s with a yield of 0.07 are those of the formula', (gas, voltage, pd) => {
    const found = minimumWith(gas, 0.07);
    expect(Math.abs(found.voltage / voltage - 1)).toBeLessThan(5e-3);
    expect(Math.abs(found.pd / (pd * (293.15 / 273.15)) - 1)).toBeLessThan(0.012); // and the step of the search
  });

  // exact algebra: V = e (B/A) L, pd = e L/A, γ = 0.01: hydrogen 5, 130: 326 V at 2.51; carbon dioxide 20, 466: 292 V at 0.627; water vapour 13, 290: 280 V at 0.965; helium 3, 34: 142 V at 4.18 (computed)
  it.each([
    ['hydrogen', 'raizer', 326, 2.51],
    ['carbon dioxide', 'raizer', 292, 0.627],
    ['water vapour', 'raizer', 280, 0.965],
    ['helium', 'raizer', 142, 4.18],
    ['neon', 'raizer', 314, 3.14],
  ])('in %s, set %s, are those of the formula, attachment aside', (gas, set, voltage, pd) => {
    const found = minimum(gas, set, () => 0.01);
    expect(found.voltage / voltage).toBeGreaterThan(0.995);
    expect(found.voltage / voltage).toBeLessThan(1.01); // dissociative attachment lifts water vapour by 0.6 %
    expect(Math.abs(found.pd / pd - 1)).toBeLessThan(0.02);
  });
});
