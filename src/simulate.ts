import type { Case } from './case.ts';
import { cellsFor } from './gap/cells.ts';
import { makeLayout } from './gap/layout.ts';
import { FastElectrons } from './laws/fast-electrons.ts';
import { GapEquations } from './laws/gap-equations.ts';
import { lawsOf } from './laws/of-case.ts';
import { GapSystem } from './march/gap-system.ts';
import { initialState, releaseParticles } from './march/initial.ts';
import { March, MarchFailure } from './march/march.ts';
import { Particles, particleSettingsOf, type UniformAnswers } from './march/particles.ts';
import { RODAS } from './march/scheme.ts';
import { Analysis } from './onset/analysis.ts';
import type { RunContext } from './onset/context.ts';
import type { Outcome, Stop } from './onset/outcome.ts';
import { scalesOf } from './onset/scales.ts';
import type { Snapshot } from './onset/snapshot-watch.ts';
import { Circuit } from './supply/circuit.ts';
import { OpenGap } from './supply/open-gap.ts';
import { Trip } from './supply/trip.ts';
import { kineticGapOf } from './theory/kinetic.ts';

/** Where a run is, for a progress line. */
export interface Progress {
  readonly time_s: number;
  readonly until_s: number;
  readonly current_A: number;
  readonly gap_voltage_V: number;
  /** d ln|I|/dt over the last step; null at the start */
  readonly growth_per_s: number | null;
  readonly steps: number;
}

/** Who wants to follow a run. */
export interface Watch {
  /** polled between steps; true ends the run with stop `interrupted` */
  interrupted?(): boolean;
  /** called about every 50 ms of wall time */
  progress?(p: Progress): void;
  /** called once before the first snapshot */
  begin?(layout: { readonly x: Float64Array; readonly negativeIons: boolean }): void;
  /** called so that each stage of the onset is resolved; the arrays are reused */
  snapshot?(s: Snapshot): void;
}

/** A simulation that could not be completed: says where and what to try. */
export class SimulationFailure extends Error {
  readonly time: number;
  readonly step: number;
  readonly cell: number;
  readonly hint: string;
  /** what was found up to the last good state */
  readonly outcome: Outcome;
  constructor(cause: MarchFailure, hint: string, outcome: Outcome) {
    super(`${cause.message} (step ${cause.step}, cell ${cause.cell}); ${hint}`);
    this.time = cause.time;
    this.step = cause.step;
    this.cell = cause.cell;
    this.hint = hint;
    this.outcome = outcome;
  }
}

/** Wall time between two looks at the event loop [ms]. */
const SLICE = 50;

/** A case → what happens, in time. Yields to the event loop every ~50 ms of wall time.
 *  @throws SimulationFailure when the run cannot go on */
export async function simulate(settings: Case, watch: Watch = {}): Promise<Outcome> {
  const run = new Run(settings, watch);
  while (run.slice()) await new Promise<void>((resume) => setImmediate(resume));
  return run.outcome();
}

/** The same without yielding, for workers and tests. */
export function simulateNow(settings: Case, watch: Watch = {}): Outcome {
  const run = new Run(settings, watch);
  while (run.slice());
  return run.outcome();
}

/** A march and the analysis that watches it, for a case: the whole model in one place. */
function assemble(settings: Case, watch: Watch): { march: March; analysis: Analysis } {
  const scales = scalesOf(settings);
  const laws = lawsOf(settings);
  const grid = cellsFor(settings.gap, settings.numerics.cells, scales.cathodes, scales.layer);
  const layout = makeLayout(grid.cells, laws.species.length);
  const circuit = new Circuit(settings.supply);
  const kinetic = particleSettingsOf(settings, scales.ionTransit, (voltage) => uniformAnswer(settings, voltage));
  const fast = kinetic === null ? null : new FastElectrons(grid);
  const system = new GapSystem(new GapEquations(grid, layout, laws, fast), circuit);
  const particles = kinetic === null || fast === null ? null : new Particles(kinetic, fast, grid, layout);
  const voltage = circuit.begin(0, settings.supply.initialGapVoltage);
  const alpha = laws.density * laws.ionisation.valueAt(Math.abs(voltage) / (laws.density * grid.spacing));
  const released = { electrons: settings.seed.electrons, leftIsCathode: scales.firstIsLeft, alpha };
  const initial = initialState(grid, layout, particles === null ? released : { ...released, electrons: 0 }, voltage);
  if (particles !== null && fast !== null && released.electrons > 0) {
    system.settle(initial);
    particles.look(0, initial);
    releaseParticles(grid, layout, fast, released.electrons, initial);
  }
  const openGap = new OpenGap(circuit, system.capacitance, voltage);
  const trip = settings.supply.trip === null ? null : new Trip(settings.supply.trip);

  const context: RunContext = { ...scales, settings, system, march: () => march };
  const analysis = new Analysis(context, initial, watch);
  const march = new March(
    system,
    openGap,
    trip,
    initial,
    {
      until: settings.observe.until,
      scheme: RODAS,
      errorScale: scales.errorScale(laws.species.length),
      electronTransit: scales.electronTransit,
      ionTransit: scales.ionTransit,
      particles,
    },
    analysis.observers,
  );
  march.begin();
  return { march, analysis };
}

/** What particles do in the gap without space charge. */
function uniformAnswer(settings: Case, voltage: number): ReturnType<UniformAnswers> {
  const gap = kineticGapOf(settings, 1);
  if (gap === null) throw new Error('electrons follow the local field');
  return gap.answer(voltage);
}

/** One run in slices of wall time. */
class Run {
  readonly #settings: Case;
  readonly #watch: Watch;
  readonly #march: March;
  readonly #analysis: Analysis;
  readonly #began: number = performance.now();
  #stop: Stop | null = null;
  #lastCurrent = 0;
  #lastTime = 0;

  constructor(settings: Case, watch: Watch) {
    this.#settings = settings;
    this.#watch = watch;
    const { march, analysis } = assemble(settings, watch);
    this.#march = march;
    this.#analysis = analysis;
  }

  /** Marches for one slice of wall time. @returns whether there is more to do */
  slice(): boolean {
    const end = performance.now() + SLICE;
    const march = this.#march;
    try {
      while (!march.done) {
        if (this.#watch.interrupted?.()) {
          this.#stop = 'interrupted';
          return false;
        }
        march.advance();
        if (performance.now() >= end) {
          this.#report();
          return true;
        }
      }
    } catch (thrown) {
      if (!(thrown instanceof MarchFailure)) throw thrown;
      this.#stop = 'failed';
      const hint = 'try a smaller numerics.tolerance, more numerics.cells, or a rise time behind a small resistance';
      throw new SimulationFailure(thrown, hint, this.outcome());
    }
    return false;
  }

  outcome(): Outcome {
    return this.#analysis.conclude(this.#stop, (performance.now() - this.#began) / 1000);
  }

  #report(): void {
    const march = this.#march;
    const { current, time } = march.now;
    const growth =
      this.#lastCurrent !== 0 && time > this.#lastTime ? Math.log(Math.abs(current / this.#lastCurrent)) / (time - this.#lastTime) : null;
    this.#watch.progress?.({
      time_s: time,
      until_s: this.#settings.observe.until,
      current_A: current,
      gap_voltage_V: march.state[march.system.layout.voltage],
      growth_per_s: growth !== null && Number.isFinite(growth) ? growth : null,
      steps: march.steps,
    });
    this.#lastCurrent = current;
    this.#lastTime = time;
  }
}
