/** A march for a case without the onset analysis, built from the same parts as src/simulate.ts, each of which a test can replace. */
import type { Case } from '../../src/case.ts';
import { cellsFor } from '../../src/gap/cells.ts';
import type { Grid } from '../../src/gap/grid.ts';
import { makeLayout } from '../../src/gap/layout.ts';
import { GapEquations } from '../../src/laws/gap-equations.ts';
import { lawsOf } from '../../src/laws/of-case.ts';
import { GapSystem } from '../../src/march/gap-system.ts';
import { initialState } from '../../src/march/initial.ts';
import { March, type Observer } from '../../src/march/march.ts';
import { RODAS, type Scheme } from '../../src/march/scheme.ts';
import { Stepper } from '../../src/march/stepper.ts';
import { EnergyWatch } from '../../src/onset/energy-watch.ts';
import { scalesOf } from '../../src/onset/scales.ts';
import { Circuit } from '../../src/supply/circuit.ts';
import { OpenGap } from '../../src/supply/open-gap.ts';
import { Trip } from '../../src/supply/trip.ts';

/** Gap and circuit of a case, and its state at t = 0+. */
export function systemOf(settings: Case, given?: Grid): { system: GapSystem; initial: Float64Array } {
  const scales = scalesOf(settings);
  const laws = lawsOf(settings);
  const grid = given ?? cellsFor(settings.gap, settings.numerics.cells, scales.cathodes, scales.layer);
  const layout = makeLayout(grid.cells, laws.species.length);
  const circuit = new Circuit(settings.supply);
  const system = new GapSystem(new GapEquations(grid, layout, laws), circuit);
  const voltage = circuit.begin(0, settings.supply.initialGapVoltage);
  const alpha = laws.density * laws.ionisation.valueAt(Math.abs(voltage) / (laws.density * grid.spacing));
  const released = { electrons: settings.seed.electrons, leftIsCathode: scales.firstIsLeft, alpha };
  const initial = initialState(grid, layout, released, voltage);
  system.settle(initial);
  return { system, initial };
}

export interface Rig {
  readonly march: March;
  readonly system: GapSystem;
  readonly energy: EnergyWatch;
  readonly openGap: OpenGap;
}

/** @param observers made from the system, so that they can read it; look after the energies are counted */
export function rigOf(settings: Case, observers: (system: GapSystem, energy: EnergyWatch) => Observer[] = () => [], grid?: Grid): Rig {
  const { system, initial } = systemOf(settings, grid);
  const scales = scalesOf(settings);
  const energy = new EnergyWatch(system);
  const openGap = new OpenGap(system.circuit, system.capacitance, initial[system.layout.voltage]);
  const march = new March(
    system,
    openGap,
    settings.supply.trip === null ? null : new Trip(settings.supply.trip),
    initial,
    {
      until: settings.observe.until,
      scheme: RODAS,
      errorScale: scales.errorScale(system.layout.species),
      electronTransit: scales.electronTransit,
      ionTransit: scales.ionTransit,
      particles: null,
    },
    [energy, ...observers(system, energy)],
  );
  march.begin();
  return { march, system, energy, openGap };
}

/** Marches to the end. */
export function run(rig: Rig): Rig {
  while (!rig.march.done) rig.march.advance();
  return rig;
}

/** A stepper that stands on a state at time t. */
export function stepperAt(system: GapSystem, state: Float64Array, t: number, scheme: Scheme = RODAS): Stepper {
  const stepper = new Stepper(system, scheme);
  stepper.start.set(state);
  system.settle(stepper.start);
  stepper.begin(t);
  return stepper;
}

/** The state after `steps` equal steps from a state at t over a span. */
export function inEqualSteps(system: GapSystem, state: Float64Array, t: number, span: number, steps: number): Float64Array {
  const stepper = stepperAt(system, state, t);
  for (let k = 0; k < steps; k++) {
    const cell = stepper.attempt(t + (k * span) / steps, span / steps);
    if (cell >= 0) throw new Error(`equal steps: no solution in cell ${cell} at step ${k}`);
    stepper.proceed(t + ((k + 1) * span) / steps);
  }
  return stepper.start.slice();
}
