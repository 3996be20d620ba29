/** What every coefficient of every set of data of every gas must be, walked field by field. */
import { describe, expect, it } from 'vitest';
import { type Curve, curveOf } from '../../src/gases/curves.ts';
import type { Form } from '../../src/gases/forms.ts';
import type { Coefficient, GasCoefficients } from '../../src/gases/gas.ts';
import { dataSets, gasData, gases } from '../../src/gases/index.ts';

const Td = 1e-21;
const fields = [0, ...Array.from({ length: 5000 }, (_, i) => i + 1), 1e5];

interface Named {
  readonly key: keyof GasCoefficients;
  readonly coefficient: Coefficient;
  readonly curve: Curve;
}

const sets = Object.keys(gases).flatMap((gas) => dataSets(gas).map((set) => ({ gas, set })));

function coefficientsOf(gas: string, set: string): Named[] {
  const data = gasData(gas, set);
  if (data === null) throw new Error(`no set ${set} of ${gas}`);
  return Object.entries(data.coefficients).flatMap(([key, coefficient]: [string, Coefficient | null]) =>
    coefficient === null ? [] : [{ key: key as keyof GasCoefficients, coefficient, curve: curveOf(coefficient.form) }],
  );
}

/** the joints of a form, inner ones included */
function joints(form: Form): { at: number; below: Form; above: Form; blend: number }[] {
  if (form.kind !== 'joined') return [];
  return form.pieces.flatMap((piece, k) => [
    ...joints(piece.form),
    ...(k === 0 ? [] : [{ at: piece.from, below: form.pieces[k - 1].form, above: piece.form, blend: form.blend }]),
  ]);
}

/** whether a form takes a value below zero that it then clips */
function clips(form: Form): boolean {
  if (form.kind === 'joined') return form.pieces.some((p) => clips(p.form));
  if (form.kind === 'linear') return fields.some((x) => form.a + form.b * x * Td < 0);
  if (form.kind === 'exponential-sum') {
    return fields.some((x) => x > 0 && form.terms.reduce((sum, t) => sum + t.amplitude * Math.exp(-t.scale / (x * Td)), 0) < 0);
  }
  return false;
}

describe.each(sets)('every coefficient of $gas, set $set,', ({ gas, set }) => {
  const all = coefficientsOf(gas, set);

  it('is finite and not negative at 0, 1 … 5000 and 1e5 Td, with a finite slope', () => {
    for (const { key, curve } of all) {
      for (const x of fields) {
        const y = curve.valueAt(x * Td);
        if (!(Number.isFinite(y) && y >= 0)) expect.fail(`${key} at ${x} Td is ${y}`);
        if (!Number.isFinite(curve.slopeAt(x * Td))) expect.fail(`slope of ${key} at ${x} Td is ${curve.slopeAt(x * Td)}`);
      }
    }
  });

  it('has the slope that its differences show', () => {
    for (const { key, curve } of all) {
      for (const td of [7.3, 33, 137, 371, 911, 2345]) {
        const x = td * Td;
        const h = 1e-5 * x;
        const measured = (curve.valueAt(x + h) - curve.valueAt(x - h)) / (2 * h);
        const error = Math.abs(curve.slopeAt(x) - measured) * x;
        if (error > 1e-4 * (curve.valueAt(x) + Math.abs(measured) * x)) expect.fail(`${key} at ${td} Td: slope off by ${error}`);
      }
    }
  });

  it('has ionisation that vanishes without field and never falls up to 1000 Td', () => {
    const { curve } = all.find((c) => c.key === 'ionisation') as Named;
    expect(curve.valueAt(0)).toBe(0);
    let last = 0;
    for (let x = 1; x <= 1000; x++) {
      const y = curve.valueAt(x * Td);
      if (y < last) expect.fail(`α falls at ${x} Td`);
      last = y;
    }
    expect(last).toBeGreaterThan(1e-21);
  });

  it('moves every charge: mobility positive, drift faster in a stronger field up to 5000 Td', () => {
    for (const { key, curve } of all) {
      if (!/mobility/i.test(key)) continue;
      expect(curve.valueAt(0), key).toBeGreaterThan(0);
      expect(curve.valueAt(1e5 * Td), key).toBeGreaterThan(0);
      let last = 0;
      for (let x = 1; x <= 5000; x++) {
        const W = curve.valueAt(x * Td) * x * Td;
        if (!(W > last)) expect.fail(`${key}: drift does not rise at ${x} Td`);
        last = W;
      }
    }
  });

  it('keeps D/μ at or above kT/e of room temperature', () => {
    for (const { key, curve } of all) {
      if (/energy/i.test(key)) for (const x of fields) if (curve.valueAt(x * Td) < 0.025) expect.fail(`${key} at ${x} Td`);
    }
  });

  it('joins its pieces within 1e-3, or over a blend that its note states', () => {
    for (const { key, coefficient, curve } of all) {
      for (const { at, below, above, blend } of joints(coefficient.form)) {
        const step = Math.abs(curveOf(above).valueAt(at) / curveOf(below).valueAt(at) - 1);
        if (step > 1e-3) {
          expect(blend, `${key} steps by ${step}`).toBeGreaterThan(0);
          expect(coefficient.note, `${key} steps by ${step}`).toMatch(/smoothed|blended|spread/);
        }
        // no step is left: 1e-3 over 1e-5 of the field, where the steepest piece changes by 1e-4
        const reach = Math.max(0.05, 1.2 * blend);
        for (let x = at * (1 - reach); x < at * (1 + reach); x *= 1 + 1e-4) {
          const rise = Math.abs(curve.valueAt(x * (1 + 1e-5)) / curve.valueAt(x) - 1);
          if (rise > 1e-3) expect.fail(`${key} steps by ${rise} at ${x / Td} Td`);
        }
      }
    }
  });

  it('says so where a fit is clipped at zero', () => {
    for (const { key, coefficient } of all) if (clips(coefficient.form)) expect(coefficient.note, key).toMatch(/zero/i);
  });

  it('names source, status, uncertainty and reference temperature, and no range is empty', () => {
    for (const { key, coefficient: c } of all) {
      expect(c.source.length, key).toBeGreaterThan(15);
      expect(['read', 'second-hand', 'from memory (H)', 'from memory (M)', 'from memory (L)', 'computed'], key).toContain(c.status);
      if (c.uncertainty === null) expect(c.status, key).toBe('computed');
      else expect(c.uncertainty, key).toBeGreaterThan(0);
      expect(c.referenceTemperature, key).not.toBeUndefined();
      if (c.referenceTemperature) {
        expect(c.referenceTemperature, key).toBeGreaterThan(270);
        expect(c.referenceTemperature, key).toBeLessThan(310);
      }
      if (c.range) expect(c.range.to, key).toBeGreaterThan(c.range.from);
    }
  });

  it('has negative ions exactly where electrons attach', () => {
    const has = (key: keyof GasCoefficients): boolean => all.some((c) => c.key === key);
    expect(has('negativeIonMobility')).toBe(has('attachment'));
    expect(has('negativeIonEnergy')).toBe(has('attachment'));
  });
});

describe.each(Object.values(gases))('the data of $name', (gas) => {
  it('say of detachment that it is neglected and which way that errs, wherever electrons attach', () => {
    if (gas.coefficients.attachment === null) expect(gas.detachment).toBeNull();
    else expect(gas.detachment).toMatch(/^Neglected: V_s comes out too high, which is unsafe/);
  });

  it('give the reason for the default set and for each other one, which ionises otherwise', () => {
    expect(gas.reason.length).toBeGreaterThan(60);
    for (const [name, other] of Object.entries(gas.alternatives)) {
      expect(name).not.toBe(gas.set);
      expect(other.reason.length, name).toBeGreaterThan(40);
      const here = curveOf(gas.coefficients.ionisation.form);
      const there = curveOf((other.coefficients.ionisation ?? gas.coefficients.ionisation).form);
      const differs = [30, 100, 300, 1000, 3000].some((x) => Math.abs(there.valueAt(x * Td) / here.valueAt(x * Td) - 1) > 0.01);
      expect(differs, name).toBe(true);
    }
  });

  it('have notes, an uncertainty of V_s and a size of the molecule in the usual range', () => {
    expect(gas.notes.length).toBeGreaterThan(2);
    expect(gas.breakdownUncertainty).toBeGreaterThanOrEqual(0.1);
    expect(gas.breakdownUncertainty).toBeLessThanOrEqual(0.5);
    expect(gas.kineticCrossSection).toBeGreaterThan(2e-19);
    expect(gas.kineticCrossSection).toBeLessThan(1e-18);
  });
});

describe('sets of data', () => {
  it('are found by name, the default under its own and without one', () => {
    expect(dataSets('helium')).toEqual(['ward', 'lieberman', 'raizer']);
    expect(gasData('helium')).toBe(gases.helium);
    expect(gasData('helium', 'ward')).toBe(gases.helium);
    const raizer = gasData('helium', 'raizer');
    expect(raizer?.set).toBe('raizer');
    expect(raizer?.coefficients.ionisation.source).toMatch(/^Raizer/);
    expect(raizer?.reason).toBe(gases.helium.alternatives.raizer.reason);
    expect(raizer?.breakdownUncertainty).toBe(0.5);
  });

  it('keep what they do not replace', () => {
    expect(gasData('air', 'raizer')?.coefficients.attachment).toBe(gases.air.coefficients.attachment);
    expect(gasData('air', 'raizer')?.breakdownUncertainty).toBe(gases.air.breakdownUncertainty);
    expect(gasData('sulphur hexafluoride', 'boyd-crichton')?.coefficients.attachment).toBeNull();
  });

  it('are null for an unknown gas or set, names of object methods included', () => {
    expect(gasData('unobtainium')).toBeNull();
    expect(gasData('constructor')).toBeNull();
    expect(gasData('helium', 'morrow')).toBeNull();
    expect(gasData('helium', 'toString')).toBeNull();
    expect(dataSets('constructor')).toEqual([]);
  });
});
