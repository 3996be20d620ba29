import { describe, expect, it } from 'vitest';
import { curveOf } from '../../src/gases/curves.ts';
import { gases } from '../../src/gases/index.ts';
import { surfaces, yieldFor } from '../../src/surfaces/index.ts';

/* What the gas and surface data say about breakdown, by the Townsend criterion written out here, against published voltages. */

const k = 1.380649e-23;
/** N d of 1 Torr cm at 20 °C [1/m²] */
const TORR_CM = 101325 / 760 / (k * 293.15) / 100;
const relative = (a: number, b: number): number => Math.abs(a / b - 1);

/** feedback q = γ α/(α − η) (e^{(α−η)d} − 1) in a plane gap of Nd [1/m²] at V */
function feedback(gas: string, gamma: number, Nd: number, V: number): number {
  const { ionisation, attachment } = gases[gas].coefficients;
  const a = curveOf(ionisation.form).valueAt(V / Nd) * Nd;
  const net = a - (attachment ? curveOf(attachment.form).valueAt(V / Nd) * Nd : 0);
  return gamma * a * (Math.abs(net) < 1e-12 ? 1 : Math.expm1(net) / net);
}

/** lowest voltage with q = 1, by steps of 0.1 % upwards and bisection; NaN if none to 100 kV */
function breakdownVoltage(gas: string, gamma: number, pd: number): number {
  const Nd = pd * TORR_CM;
  for (let V = 60; V < 1e5; V *= 1.001) {
    if (feedback(gas, gamma, Nd, V) < 1) continue;
    let low = V / 1.001;
    let high = V;
    while (high / low > 1 + 1e-9) {
      const mid = Math.sqrt(low * high);
      if (feedback(gas, gamma, Nd, mid) < 1) low = mid;
      else high = mid;
    }
    return high;
  }
  return Number.NaN;
}

/** the Paschen minimum: its voltage [V] and pd [Torr cm], scanned in steps of 2 % */
function minimum(gas: string, gamma: number): { V: number; pd: number } {
  let best = { V: Number.POSITIVE_INFINITY, pd: 0 };
  for (let pd = 0.2; pd < 6; pd *= 1.02) {
    const V = breakdownVoltage(gas, gamma, pd);
    if (V < best.V) best = { V, pd };
  }
  return best;
}

describe('Paschen minima from the data', () => {
  // exact algebra of the Townsend criterion: V = e (B/A) ln(1 + 1/γ), pd = e ln(1 + 1/γ)/A; nitrogen's minimum lies in its 12, 342 branch
  it('nitrogen with a yield of 0.01 has the minimum of A 12, B 342: 358 V at 1.045 Torr cm', () => {
    const { V, pd } = minimum('nitrogen', 0.01);
    expect(relative(V, 357.5)).toBeLessThan(1e-3);
    expect(relative(pd, 1.045)).toBeLessThan(0.02); // the scan step
  });

  // Naidu and Kamaraju, High Voltage Engineering (second-hand): 327 V at 0.567 Torr cm. A yield off by a factor of two shifts the minimum by 10 to 15 %.
  it('air with the default yield of 0.01 has a minimum within 10 % of the measured 327 V', () => {
    expect(relative(minimum('air', 0.01).V, 327)).toBeLessThan(0.1);
  });

  // the same, and von Engel, Ionized Gases, 1965 (from memory, M): air on iron 330 V at 0.57. α in air tops out at 15 1/(cm Torr): pd is too large by half.
  it('the minimum of air lies at a larger pd than the measured 0.57 Torr cm, by less than 60 %', () => {
    const { pd } = minimum('air', 0.01);
    expect(pd).toBeGreaterThan(0.57);
    expect(pd).toBeLessThan(1.6 * 0.57);
  });

  // von Engel, Ionized Gases, 1965, from memory (M), two significant figures in pd: the yields were chosen to give these voltages
  it('nitrogen on iron has its minimum of 275 V at 0.75 Torr cm, within 2 % and 10 %', () => {
    const { V, pd } = minimum('nitrogen', 0.03);
    expect(relative(V, 275)).toBeLessThan(0.02);
    expect(relative(pd, 0.75)).toBeLessThan(0.1);
  });

  // von Engel 1965, from memory (M): argon on iron 265 V at 1.5 Torr cm, the low end of the yield; pd was not fitted
  it('argon on iron at the low end of its yield has its minimum of 265 V at 1.5 Torr cm, within 2 % and 5 %', () => {
    const { V, pd } = minimum('argon', yieldFor('iron', 'argon')?.ionYield.low ?? Number.NaN);
    expect(relative(V, 265)).toBeLessThan(0.02);
    expect(relative(pd, 1.5)).toBeLessThan(0.05);
  });

  // handbook spread: Naidu and Kamaraju (air 327, Ar 137, N2 251), Kuffel et al. (air 352, N2 240), von Engel (Ar/Fe 265, N2/Fe 275, air/Fe 330); from memory (M/H)
  it.each([
    ['air', [327, 330, 352]],
    ['argon', [137, 265]],
    ['nitrogen', [240, 251, 275]],
  ])(
    'in %s every handbook minimum lies between the ends of the yield of an unspecified metal',
    (gas, volts) => {
      const y = yieldFor('metal', gas)?.ionYield;
      const low = minimum(gas, y?.high ?? Number.NaN).V;
      const high = minimum(gas, y?.low ?? Number.NaN).V;
      for (const V of volts) {
        expect(V).toBeGreaterThan(low);
        expect(V).toBeLessThan(high);
      }
    },
    20_000,
  );
});

describe('long and dense gaps from the data', () => {
  // Raju, Gaseous Electronics (chapter abstract read): 1 cm at 1 atm breaks down at about 30.4 kV. DeBitetto and Fisher, 1956 (read): yield about 1e-3, multiplication about 1e3
  it('nitrogen, 1 cm at 1 atm, breaks down within 2 % of 30.4 kV with the measured yield of 1e-3', () => {
    expect(relative(breakdownVoltage('nitrogen', 1e-3, 760), 30400)).toBeLessThan(0.02);
  });

  // uniform-field air (formula second-hand): V = 24.22 x + 6.08 √x kV, x = pd/(760 Torr cm) at 20 °C.
  // 12 %: α and η fits good to 20 %, detachment and three-body attachment neglected. The data note says 1.5 % above to 11 % below.
  it.each([3, 10, 76, 760])('air at %d Torr cm breaks down within 12 % of the uniform-field formula', (pd) => {
    const x = pd / 760;
    expect(relative(breakdownVoltage('air', 0.01, pd), 24220 * x + 6080 * Math.sqrt(x))).toBeLessThan(0.12);
  });
});

describe('cathode metals', () => {
  it('have yields in order: low ≤ typical ≤ high, all positive, each with its source', () => {
    for (const s of Object.values(surfaces)) {
      for (const [gas, y] of Object.entries(s.yields)) {
        const label = `${s.name} in ${gas}`;
        expect(y.low, label).toBeGreaterThan(0);
        expect(y.low, label).toBeLessThan(y.typical);
        expect(y.high, label).toBeGreaterThan(y.typical);
        expect(y.high, label).toBeLessThan(1);
        expect(y.source.length, label).toBeGreaterThan(10);
        expect(gas === 'any' || Object.hasOwn(gases, gas), label).toBe(true);
      }
    }
  });

  // handbooks: air on iron 0.02 (M), technical surfaces 0.01 (second-hand); Phelps and Petrović 1999: Ar+ on clean metal 0.07 (H)
  it('carry the published yields', () => {
    expect(yieldFor('iron', 'air')?.ionYield.typical).toBe(0.02);
    expect(yieldFor('copper', 'air')?.ionYield.typical).toBe(0.01);
    expect(yieldFor('nickel', 'argon')?.ionYield.typical).toBe(0.07);
  });

  it('fall back to the wide row for a gas without data and for the user’s own gas', () => {
    const wide = surfaces.copper.yields.any;
    expect(yieldFor('copper', null)?.ionYield).toBe(wide);
    expect(yieldFor('copper', 'methane')?.ionYield).toBe(wide);
    expect(yieldFor('copper', 'toString')?.ionYield).toBe(wide);
    expect(wide.high / wide.low).toBeGreaterThan(99);
  });

  it('give null for an unknown material, names of object methods included', () => {
    expect(yieldFor('unobtainium', 'air')).toBeNull();
    expect(yieldFor('constructor', 'air')).toBeNull();
  });

  // Riviere 1957, contact potential (read), each ± 0.03 to 0.05 eV
  it.each([
    ['tungsten', 4.565],
    ['copper', 4.52],
    ['silver', 4.31],
    ['gold', 4.7],
    ['aluminium', 4.2],
    ['nickel', 4.74],
    ['molybdenum', 4.22],
    ['iron', 4.17],
  ])('%s has the work function of Riviere', (metal, phi) => {
    expect(yieldFor(metal, null)?.workFunction).toBe(phi);
  });

  // Normal cathode falls (Cobine 1941; von Engel 1965; Raizer 1991; from memory, M) turned into yields by the relation of von Engel and Steenbeck,
  // V_n = 3.017 (B/A) ln(1 + 1/γ) (computed), with B/A of argon 15, nitrogen 28.5, air 24.33 V. A model of the fall, so only the spread is tested.
  it.each([
    ['argon', 180 / 12, { aluminium: 100, silver: 130, gold: 130, copper: 130, iron: 165, nickel: 131 }],
    ['nitrogen', 342 / 12, { aluminium: 180, silver: 233, gold: 233, copper: 208, iron: 215, nickel: 197 }],
    ['air', 365 / 15, { aluminium: 229, silver: 280, gold: 285, copper: 370, iron: 269, nickel: 226 }],
  ])('in %s yields from normal cathode falls lie within the spread of each metal', (gas, ratio, falls) => {
    for (const [metal, V] of Object.entries(falls)) {
      const gamma = 1 / Math.expm1(V / (3.017 * ratio));
      const y = yieldFor(metal, gas)?.ionYield;
      expect(gamma, metal).toBeGreaterThan(y?.low ?? Number.NaN);
      expect(gamma, metal).toBeLessThan(y?.high ?? Number.NaN);
    }
  });
});
