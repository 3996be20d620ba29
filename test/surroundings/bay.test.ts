import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { effusionSpeed, jetFunction } from '../../src/surroundings/aperture.ts';
import { airAt } from '../../src/surroundings/atmosphere.ts';
import { type Bay, type BaySettings, followBay, LEAST_PRESSURE } from '../../src/surroundings/bay.ts';
import { type Vent, ventFlow } from '../../src/surroundings/conductance.ts';
import { FLOW_GASES, thermalSpeed } from '../../src/surroundings/flow-gas.ts';
import { outgassing } from '../../src/surroundings/outgassing.ts';
import { pumpFlow } from '../../src/surroundings/pump.ts';
import { constant, fromRows } from '../../src/surroundings/series.ts';

const gas = FLOW_GASES.air;
const T = constant(295);
const sealed: BaySettings = { volume: 0.012, start: 101325, gas, outside: null, vents: [], pump: null, gasLoad: 0, outgassing: [] };
const vacuum = { kind: 'fixed', pressure: 0 } as const;
const vent: Vent = { diameter: 5e-3, length: 2e-3, count: 4, dischargeCoefficient: 0.7 };
/** the example of the design: 12 L, four holes, pump, load, outgassing */
const busy: BaySettings = {
  ...sealed,
  outside: { kind: 'ascent', ascent: { from: 0, to: 35000, rate: 5 } },
  vents: [vent],
  pump: { speed: 1e-3, basePressure: 1e-4 },
  gasLoad: 1e-5,
  outgassing: [{ area: 0.4, rateAtOneHour: 1.33e-5, exponent: 1 }],
};

/** largest relative error at times spread evenly and logarithmically */
function worst(bay: Bay, exact: (t: number) => number, duration: number): number {
  let error = 0;
  for (let i = 0; i < 1000; i++) {
    for (const t of [(duration * (i + 0.37)) / 1000, duration * 10 ** (-8 * (i / 1000))])
      error = Math.max(error, Math.abs(bay.pressureAt(t) / exact(t) - 1));
  }
  return error;
}

describe('a bay follows the closed form', () => {
  it('of pumping down: p = p∞ + (p0 − p∞) e^{−St/V}, p∞ = p_base + Q/S', () => {
    // vacuum handbooks, reference-values §11
    const pump = { speed: 0.05, basePressure: 1e-4 };
    for (const gasLoad of [0, 1e-5]) {
      const bay = followBay({ ...sealed, pump, gasLoad }, T, 1000);
      const last = 1e-4 + gasLoad / 0.05;
      expect(worst(bay, (t) => last + (101325 - last) * Math.exp((-0.05 * t) / 0.012), 1000)).toBeLessThan(1e-6);
    }
  });

  it('of pumping down without end, at which the least pressure is held', () => {
    const bay = followBay({ ...sealed, pump: { speed: 0.05, basePressure: 0 } }, T, 1e5);
    expect(worst(bay, (t) => LEAST_PRESSURE + (101325 - LEAST_PRESSURE) * Math.exp((-0.05 * t) / 0.012), 1e5)).toBeLessThan(1e-6);
  });

  it('of a load into an evacuated tube: p = Q t/V', () => {
    const bay = followBay({ ...sealed, start: 0, gasLoad: 1e-5 }, T, 1e5);
    expect(worst(bay, (t) => LEAST_PRESSURE + (1e-5 * t) / 0.012, 1e5)).toBeLessThan(1e-6);
  });

  it('of free molecules leaving through a hole: p = p0 e^{−Ct/V} + Q/C', () => {
    const hole = { diameter: 2e-3, length: 0, count: 3, dischargeCoefficient: 0.7 };
    const conductance = 3 * Math.PI * 1e-6 * effusionSpeed(gas, 295);
    const bay = followBay({ ...sealed, start: 1e-6, outside: vacuum, vents: [hole], gasLoad: 1e-13 }, T, 200);
    const last = 1e-13 / conductance + LEAST_PRESSURE;
    expect(worst(bay, (t) => last + (1e-6 - last) * Math.exp((-conductance * t) / 0.012), 200)).toBeLessThan(1e-6);
  });

  it('of a choked jet: ln p falls at C_d A c ψ/V', () => {
    const bay = followBay({ ...sealed, outside: vacuum, vents: [{ ...vent, length: 0 }] }, T, 5);
    const rate = (0.7 * 4 * Math.PI * 2.5e-3 ** 2 * thermalSpeed(gas, 295) * jetFunction(1.4, 1)) / 0.012;
    expect(bay.pressureAt(5)).toBeGreaterThan(1000);
    expect(worst(bay, (t) => 101325 * Math.exp(-rate * t), 5)).toBeLessThan(1e-6);
  });

  it('of outgassing into a sealed volume: held for a minute, then the power law', () => {
    for (const exponent of [0.5, 1, 1.3]) {
      const bay = followBay({ ...sealed, start: 1, outgassing: [{ area: 2, rateAtOneHour: 3e-7, exponent }] }, T, 86400);
      const given = (t: number): number => {
        const held = Math.min(t, 60) * (60 / 3600) ** -exponent;
        if (t <= 60) return held;
        const law =
          exponent === 1 ? 3600 * Math.log(t / 60) : (3600 / (1 - exponent)) * ((t / 3600) ** (1 - exponent) - (1 / 60) ** (1 - exponent));
        return held + law;
      };
      expect(worst(bay, (t) => 1 + (6e-7 * given(t)) / 0.012, 86400)).toBeLessThan(1e-6);
    }
  });

  it('of a sealed volume that warms and cools: p ∝ T', () => {
    const temperature = fromRows({ times: [0, 100, 250], values: [295, 360, 240] });
    expect(worst(followBay({ ...sealed, start: 200 }, temperature, 300), (t) => (200 * temperature.at(t)) / 295, 300)).toBeLessThan(1e-12);
  });
});

describe('a bay', () => {
  it('agrees with small explicit steps where vents, pump, load, outgassing, ascent and warming act together', () => {
    // the same laws, but classical Runge–Kutta in N T = p: an oracle for the integration
    const temperature = fromRows({ times: [0, 2000, 4000], values: [290, 310, 270] });
    const settings = {
      ...busy,
      vents: [
        { ...vent, diameter: 1e-3, count: 1 },
        { ...vent, diameter: 6e-4, length: 0.1, count: 1 },
      ],
    };
    const bay = followBay(settings, temperature, 2700);
    const inflow = (t: number, p: number): number => {
      const outside = airAt(Math.min(35000, 5 * t)).pressure;
      const vents = settings.vents.reduce((sum, v) => sum + ventFlow(gas, temperature.at(t), v, outside, p), 0);
      return vents - 1e-3 * (p - 1e-4) + 1e-5 + 0.4 * 1.33e-5 * (3600 / Math.max(60, t));
    };
    const rate = (t: number, n: number): number => inflow(t, n * temperature.at(t)) / (0.012 * temperature.at(t));
    let n = 101325 / 290;
    let error = 0;
    // the flow starts from rest as the root of the difference: very small steps at first
    for (let t = 0, h = 1e-9; t < 2600; t += h) {
      h = Math.min(1, 1e-9 + 0.01 * t, t < 60 ? 60 - t : Infinity);
      const k1 = rate(t, n);
      const k2 = rate(t + h / 2, n + (h / 2) * k1);
      const k3 = rate(t + h / 2, n + (h / 2) * k2);
      const k4 = rate(t + h, n + h * k3);
      n += (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
      error = Math.max(error, Math.abs(bay.pressureAt(t + h) / (n * temperature.at(t + h)) - 1));
    }
    expect(error).toBeLessThan(1e-6);
    // the vents throttle what the pump takes
    expect(bay.pressureAt(2600) / airAt(13000).pressure).toBeLessThan(0.9);
  });

  it('gains what flows in: ∫ Σ flows/T dt = V Δ(p/T)', () => {
    const temperature = fromRows({ times: [0, 600], values: [290, 330] });
    const bay = followBay({ ...busy, outside: vacuum }, temperature, 600);
    // Simpson's rule over ln t: the flows change fast at first
    const [from, to] = [1e-3, 600];
    const n = 4000;
    const step = Math.log(to / from) / n;
    let sum = 0;
    for (let i = 0; i <= n; i++) {
      const t = from * Math.exp(i * step);
      const flows = bay.flowsAt(t);
      const total = flows.vents + flows.pump + flows.gasLoad + flows.outgassing;
      sum += ((i === 0 || i === n ? 1 : i % 2 === 1 ? 4 : 2) * (step / 3) * t * total) / temperature.at(t);
    }
    const gained = 0.012 * (bay.pressureAt(to) / temperature.at(to) - bay.pressureAt(from) / temperature.at(from));
    expect(gained).toBeLessThan(-4);
    expect(Math.abs(sum / gained - 1)).toBeLessThan(1e-6);
  });

  it('comes to rest where inflow equals outflow', () => {
    const bay = followBay({ ...busy, outside: vacuum, pump: null, outgassing: [] }, T, 3600);
    const p = bay.pressureAt(3600);
    expect(Math.abs(ventFlow(gas, 295, vent, p, 0) / 1e-5 - 1)).toBeLessThan(1e-6);
  });

  it('follows the air outside through wide vents, however wide, without small steps', () => {
    for (const [diameter, volume] of [
      [0.02, 0.012],
      [0.1, 1e-6],
    ]) {
      const bay = followBay({ ...busy, volume, vents: [{ ...vent, diameter }], pump: null, gasLoad: 0, outgassing: [] }, T, 8000);
      for (let t = 0; t <= 8000; t += 123)
        expect(Math.abs(bay.pressureAt(t) / airAt(Math.min(35000, 5 * t)).pressure - 1)).toBeLessThan(1e-6);
      expect(bay.steps).toBeLessThan(300);
    }
  });

  it('on an ascent keeps the overpressure that drives the jet through its vent', () => {
    // Bernoulli: Δp = ½ ρ [V̇/(C_d A)]², V̇ = V |d ln p/dt| = V 5 m/s ρ g/p; 60 ppm of the pressure, of which friction adds a few per cent
    const hole = { diameter: 2e-3, length: 0, count: 1, dischargeCoefficient: 0.7 };
    const ascent = { from: 0, to: 5000, rate: 5 };
    const bay = followBay({ ...sealed, start: airAt(0).pressure, outside: { kind: 'ascent', ascent }, vents: [hole] }, T, 1000);
    for (const t of [100, 400, 900]) {
      const air = airAt(5 * t);
      const leaving = (0.012 * 5 * air.density * 9.80665) / air.pressure;
      const rho = air.pressure / thermalSpeed(gas, 295) ** 2;
      const drop = 0.5 * rho * (leaving / (0.7 * Math.PI * 1e-6)) ** 2;
      expect(Math.abs((bay.pressureAt(t) - air.pressure) / drop - 1)).toBeLessThan(0.03);
    }
  });

  it('fills from outside as it empties: never beyond what drives it, and the slower the smaller the vent', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -4, max: -2, noNaN: true }),
        fc.constantFrom(0, 2e-3, 0.3),
        fc.double({ min: -3, max: 5, noNaN: true }),
        fc.double({ min: -3, max: 5, noNaN: true }),
        (logDiameter, length, logStart, logOutside) => {
          const [start, outside] = [10 ** logStart, 10 ** logOutside];
          const of = (diameter: number): Bay =>
            followBay(
              { ...sealed, start, outside: { kind: 'fixed', pressure: outside }, vents: [{ ...vent, diameter, length, count: 1 }] },
              T,
              100,
            );
          const [narrow, wide] = [of(10 ** logDiameter), of(1.3 * 10 ** logDiameter)];
          const direction = Math.sign(outside - start);
          let last = start;
          for (let t = 0; t <= 100; t += 4) {
            const p = narrow.pressureAt(t);
            expect(direction * (p - last)).toBeGreaterThanOrEqual(-3e-8 * p);
            expect(direction * (outside - p)).toBeGreaterThanOrEqual(-3e-8 * p);
            expect(direction * (wide.pressureAt(t) - p)).toBeGreaterThanOrEqual(-1e-7 * p);
            last = p;
          }
        },
      ),
      { numRuns: 15 },
    );
  });

  it('refuses vents to nowhere, no volume, and an ascent out of the atmosphere', () => {
    expect(() => followBay({ ...sealed, vents: [vent] }, T, 1)).toThrow(RangeError);
    expect(() => followBay({ ...sealed, volume: 0 }, T, 1)).toThrow(RangeError);
    expect(() => followBay({ ...busy, outside: { kind: 'ascent', ascent: { from: 0, to: 1e5, rate: 5 } } }, T, 1)).toThrow(RangeError);
  });
});

describe('the laws of feed and drain', () => {
  it('outgassing falls as its power of time and is held before a minute', () => {
    // water on unbaked steel: about 2.2e-9 Torr L/(s cm²) at 1 h and a tenth of it at 10 h (rule of accelerator laboratories, second-hand)
    const steel = [{ area: 1, rateAtOneHour: 2.2e-9 * 1333.22, exponent: 1 }];
    expect(outgassing(steel, 3600)).toBeCloseTo(2.933e-6, 9);
    expect(outgassing(steel, 36000) / outgassing(steel, 3600)).toBeCloseTo(0.1, 12);
    const polymer = [{ area: 1, rateAtOneHour: 1, exponent: 0.5 }];
    expect(outgassing(polymer, 14400)).toBeCloseTo(0.5, 12);
    expect(outgassing([...steel, ...polymer], 7200)).toBeCloseTo(outgassing(steel, 7200) + outgassing(polymer, 7200), 15);
    expect(outgassing(steel, 0)).toBe(outgassing(steel, 60));
    expect(outgassing(steel, 61)).toBeLessThan(outgassing(steel, 60));
  });

  it('a pump takes its speed far above the base pressure, nothing at it, and gives gas back below it', () => {
    const pump = { speed: 0.05, basePressure: 1e-4 };
    expect(pumpFlow(pump, 1e5) / 1e5).toBeCloseTo(0.05, 9);
    expect(pumpFlow(pump, 1e-4)).toBe(0);
    expect(pumpFlow(pump, 0.5e-4)).toBeLessThan(0);
  });
});
