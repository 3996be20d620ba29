import { effusionSpeed, jetFunction } from '../../src/surroundings/aperture.ts';
import { followBay } from '../../src/surroundings/bay.ts';
import { type Vent, ventFlow } from '../../src/surroundings/conductance.ts';
import { FLOW_GASES, thermalSpeed } from '../../src/surroundings/flow-gas.ts';
import { constant } from '../../src/surroundings/series.ts';
import { transmission } from '../../src/surroundings/tube.ts';
import { type Check, type Source, within } from './check.ts';

const T = 293.15;
const { air, nitrogen, water } = FLOW_GASES;
const vent = (diameter: number, length: number): Vent => ({ diameter, length, count: 1, dischargeCoefficient: 1 });

/** Clausing’s chance of a molecule to pass a round tube of length over radius */
const clausing = (lengthOverRadius: number, value: number): Check => ({
  check: `transmission of a tube, length ${lengthOverRadius} radii, free molecules`,
  published: value,
  unit: '',
  allowed: within(0.01),
  reason: 'Santeler’s approximation, which the program uses, claims 0.7 %',
  status: 'from memory (H)',
  independentOf: 'Clausing’s integral equation: an orifice and a long tube in series with a corrected length',
  simulated: false,
  compute: () => transmission(lengthOverRadius, 1),
});

const sameLaw = (check: string, published: number, unit: string, compute: () => number): Check => ({
  check,
  published,
  unit,
  allowed: within(5e-4),
  reason: 'digits printed',
  status: 'computed',
  independentOf: null,
  simulated: false,
  compute,
});

/** pressure of a pumped volume of 12 L after a time [s], 50 L/s, from one atmosphere, with a gas load [Pa m³/s] */
const pumped = (seconds: number, load: number): Check => {
  const [V, S, p0] = [0.012, 0.05, 101325];
  const last = load / S;
  return {
    check: `pump-down of 12 L at 50 L/s, load ${load} Pa m³/s, after ${seconds} s`,
    published: Number((last + (p0 - last) * Math.exp((-S * seconds) / V)).toPrecision(6)),
    unit: 'Pa',
    allowed: within(1e-5),
    reason: 'the integrator’s tolerance, 1e-6 of the pressure; six digits',
    status: 'from memory (H)',
    independentOf: 'the closed form p = Q/S + (p0 − Q/S) e^{−St/V}: the balance of gas is stepped in time',
    simulated: false,
    compute: () =>
      followBay(
        { volume: V, start: p0, gas: air, outside: null, vents: [], pump: { speed: S, basePressure: 0 }, gasLoad: load, outgassing: [] },
        constant(295),
        10,
      ).pressureAt(seconds),
  };
};

export const vacuumHandbooks: Source = {
  source: 'Vacuum handbooks: Clausing 1932; O’Hanlon; kinetic theory and gas dynamics',
  checks: [
    clausing(1, 0.67198),
    clausing(2, 0.51423),
    clausing(10, 0.19094),
    pumped(1, 0),
    pumped(3, 0),
    pumped(5, 1e-3),
    {
      check: 'long tube, viscous air, 135 D⁴ p/L L/s (cm, mbar): 1 cm by 10 m at 100',
      published: 13.5,
      unit: 'L/s',
      allowed: within(0.005),
      reason: 'three digits of the constant (0.4 %); slip adds 0.1 %',
      status: 'from memory (H)',
      independentOf: null, // Poiseuille on both sides
      simulated: false,
      compute: () => (1000 * ventFlow(air, T, vent(0.01, 10), 1e4 + 1, 1e4 - 1)) / 2,
    },
    sameLaw('hole, free molecules of air at 20 °C', 11.57, 'L/(s cm²)', () => effusionSpeed(air, T) / 10),
    sameLaw('hole, free molecules of nitrogen at 20 °C', 11.77, 'L/(s cm²)', () => effusionSpeed(nitrogen, T) / 10),
    sameLaw('hole, free molecules of water vapour at 20 °C', 14.67, 'L/(s cm²)', () => effusionSpeed(water, T) / 10),
    sameLaw('hole, choked jet of air at 20 °C', 19.86, 'L/(s cm²)', () => (thermalSpeed(air, T) * jetFunction(1.4, 1)) / 10),
  ],
};
