import type { Observer, Step } from '../march/march.ts';
import { cathodeLayer } from '../observables/cathode-layer.ts';
import { cathodeField } from '../observables/walls.ts';
import { kineticsOf } from '../theory/kinetic.ts';
import { type Prospects, predict, prospects, type Theory } from '../theory/predict.ts';
import { VERSION } from '../version.ts';
import { ArcWatch } from './arc-watch.ts';
import { cautionsOf } from './cautions/index.ts';
import type { RunContext } from './context.ts';
import { CurrentsWatch } from './currents-watch.ts';
import { Distortion } from './distortion.ts';
import { EnergyWatch } from './energy-watch.ts';
import type { Findings } from './findings.ts';
import { GrowthWatch } from './growth-watch.ts';
import { highestOpenGapVoltage } from './highest-voltage.ts';
import { judge } from './judge.ts';
import { LagWatch } from './lag-watch.ts';
import { LayerWatch } from './layer-watch.ts';
import { NumericsWatch } from './numerics-watch.ts';
import { OpenGapWatch } from './open-gap-watch.ts';
import { oscillationOf } from './oscillation.ts';
import type { Caution, Final, Onset, Outcome, Stop, Verdict } from './outcome.ts';
import { polaritiesOf } from './polarity.ts';
import { RangeWatch } from './range-watch.ts';
import { type Snapshot, SnapshotWatch } from './snapshot-watch.ts';
import { StopWatch } from './stop-watch.ts';
import { SustainWatch } from './sustain-watch.ts';
import { SwingGuard } from './swing-guard.ts';
import { SwingWatch } from './swing-watch.ts';
import { ThresholdWatch } from './threshold-watch.ts';
import { TripWatch } from './trip-watch.ts';

/** Who takes the snapshots of a run. */
interface Takers {
  begin?(layout: { readonly x: Float64Array; readonly negativeIons: boolean }): void;
  snapshot?(s: Snapshot): void;
}

/** Swings of the gap voltage below this share of the largest V_open do not count as oscillation. */
const SMALLEST_SWING = 0.01;

/** Watches a march and, at its end, says what happened. */
export class Analysis {
  readonly observers: readonly Observer[];
  readonly #context: RunContext;
  readonly #energy: EnergyWatch;
  readonly #numerics: NumericsWatch;
  readonly #range: RangeWatch;
  readonly #openGap: OpenGapWatch;
  readonly #threshold: ThresholdWatch;
  readonly #lag: LagWatch;
  readonly #growth: GrowthWatch;
  readonly #currents: CurrentsWatch;
  readonly #swing: SwingWatch;
  readonly #trip: TripWatch;
  readonly #sustain: SustainWatch;
  readonly #layer: LayerWatch;
  readonly #arc: ArcWatch;
  readonly #stop: StopWatch;
  readonly #snapshots: SnapshotWatch | null;
  #lastStep: Step | null = null;

  constructor(context: RunContext, initial: Float64Array, takers: Takers) {
    const { system, settings } = context;
    const distortion = new Distortion(context);
    this.#context = context;
    this.#energy = new EnergyWatch(system);
    this.#numerics = new NumericsWatch(system, this.#energy, distortion, initial);
    this.#range = new RangeWatch(system, settings.gas.coefficients);
    this.#openGap = new OpenGapWatch(context);
    this.#threshold = new ThresholdWatch(context);
    this.#lag = new LagWatch(context, this.#threshold, distortion);
    this.#growth = new GrowthWatch(context, distortion);
    this.#currents = new CurrentsWatch(system, settings.observe.currents);
    this.#swing = new SwingWatch(system, SMALLEST_SWING * Math.abs(highestOpenGapVoltage(settings)));
    this.#trip = new TripWatch(context, this.#energy, this.#threshold);
    this.#sustain = new SustainWatch(context, distortion);
    this.#layer = new LayerWatch(system, this.#sustain);
    this.#arc = new ArcWatch(context);
    const guard = new SwingGuard(context, this.#sustain);
    this.#stop = new StopWatch(context, this.#sustain, this.#arc, guard);
    takers.begin?.({ x: system.grid.centres, negativeIons: system.equations.charges.length > 2 });
    const take = takers.snapshot?.bind(takers);
    this.#snapshots = take ? new SnapshotWatch(system, this.#energy, take) : null;
    // each looks after those it asks
    this.observers = [
      this.#energy,
      this.#numerics,
      this.#range,
      this.#openGap,
      this.#threshold,
      this.#lag,
      this.#growth,
      this.#currents,
      this.#swing,
      this.#trip,
      this.#sustain,
      this.#layer,
      this.#arc,
      ...(this.#snapshots ? [this.#snapshots] : []),
      { look: (step) => this.#keep(step) },
      guard,
      this.#stop,
    ];
  }

  #keep(step: Step): boolean {
    this.#lastStep = step;
    return false;
  }

  /** The outcome at the end of the march.
   *  @param forced a stop from outside the march: interrupted or failed
   *  @param wall wall time of the run [s] */
  conclude(forced: Stop | null, wall: number): Outcome {
    const { settings } = this.#context;
    if (this.#lastStep) this.#snapshots?.finish(this.#lastStep);
    const stop = forced ?? this.#stop.stop ?? 'until';
    if (forced === null) this.#openGap.lookAhead();
    if (stop === 'steady') this.#arc.lookAhead();

    const voltage = this.#openGap.largest;
    const theory = predict(settings, voltage);
    const outlook = prospects(settings, voltage);
    const kinetics = kineticsOf(settings, voltage);
    const onset: Onset = { ...this.#lag.onset(), growth_rate_per_s: this.#growth.rate() };
    const final = this.#final(stop);
    const findings = this.#findings(onset, final, theory, outlook);
    const verdict = judge(findings);
    const { peak, levels } = this.#currents;
    return {
      format: 'gapwake.outcome/1',
      title: settings.title,
      version: VERSION,
      case_sha256: settings.sha256,
      verdict,
      theory,
      ...(kinetics === null ? {} : { kinetics }),
      onset,
      oscillation: findings.oscillation,
      peak: { current_A: peak.current, time_s: peak.time, gap_voltage_V: peak.voltage },
      final,
      energy: { gap_J: this.#energy.gap, source_J: this.#energy.source, after_trip_J: this.#trip.energyAfter() },
      currents: levels.map((l) => ({ level_A: l.level, time_s: l.time, gap_voltage_V: l.voltage })),
      cautions: this.#cautions(verdict, onset, final, theory, outlook),
      numerics: this.#report(wall),
    };
  }

  #final(stop: Stop): Final {
    const { system, march } = this.#context;
    const { now } = march();
    return {
      time_s: now.time,
      stop,
      gap_voltage_V: now.y[system.layout.voltage],
      current_A: now.current,
      cathode_field_V_per_m: Math.abs(cathodeField(system.layout, now.y)),
      // where next to nothing is left of the field its profile says nothing
      cathode_layer_m: this.#sustain.distorted ? (cathodeLayer(system.grid, system.layout, now.y)?.thickness ?? null) : null,
    };
  }

  #findings(onset: Onset, final: Final, theory: Theory, outlook: Prospects): Findings {
    const { settings, system, ionTransit } = this.#context;
    const oscillation = oscillationOf(this.#swing.swings.turns, final.time_s);
    const { selfSustaining, feedback, distortion, growth, carrierGrowth, brokeDown } = this.#sustain;
    const { time, stretches, decades } = this.#threshold;
    const { time: tripTime, byCharging, timeAbove } = this.#trip;
    const { range } = settings.gas.coefficients.ionisation;
    const x = outlook.breakdownReducedField;
    return {
      brokeDown,
      arcRisk: this.#arc.risk,
      largestDistortion: this.#lag.largestDistortion,
      onset,
      oscillation,
      // within the last period
      supplyChanges: oscillation !== null && system.circuit.nextCorner(final.time_s - oscillation.period_s) < Infinity,
      above: { time, stretches, decades },
      trip: tripTime === null ? null : { time: tripTime, byCharging, timeAbove },
      end: {
        stop: final.stop,
        time: final.time_s,
        current: Math.abs(final.current_A),
        voltage: Math.abs(final.gap_voltage_V),
        loaded: this.#openGap.loaded(),
        selfSustaining,
        feedback,
        distortion,
        growth: growth === null || carrierGrowth === null ? null : Math.min(growth, carrierGrowth),
        theoreticalGrowth: predict(settings, final.gap_voltage_V).growth_rate_per_s,
      },
      ionTransit,
      largestGapVoltage: this.#openGap.largestGapVoltage,
      stillCharging: final.stop === 'until' && this.#openGap.charging(),
      polarities: polaritiesOf(settings, this.#openGap.highest, this.#openGap.lowest),
      thresholdOutsideData: settings.electrons === undefined && x !== null && range !== null && (x < range.from || x > range.to),
      overvoltage: theory.overvoltage,
      breakdownUncertainty: settings.gas.breakdownUncertainty,
    };
  }

  #cautions(verdict: Verdict, onset: Onset, final: Final, theory: Theory, outlook: Prospects): Caution[] {
    const { settings, system } = this.#context;
    const { largest } = this.#openGap;
    const current = Math.abs(final.current_A);
    const behindResistance = system.circuit.feed === 'resistor' && largest !== 0;
    return cautionsOf(settings, largest, theory, outlook, {
      broken: verdict.state === 'breaks-down',
      held: verdict.state === 'holds',
      arcRisk: this.#arc.risk,
      largestCurrent: this.#arc.largestCurrent,
      thresholdTime: onset.threshold_time_s,
      lag: onset.formative_lag_s,
      timeAboveThreshold: this.#threshold.time,
      largestFeedback: this.#threshold.largestFeedback,
      steadyGlow: final.stop === 'steady' && this.#sustain.distorted && this.#sustain.selfSustaining,
      currentDensity: current / settings.gap.area,
      largestCathodeField: this.#layer.largestField,
      outside: this.#range.shares(),
      seedDrop: behindResistance ? (current * system.circuit.resistance) / Math.abs(largest) : 0,
      layerCells: this.#layer.fewestCells,
      undershoot: this.#numerics.worstInDischarge,
    });
  }

  #report(wall: number): Outcome['numerics'] {
    const { settings, system, march } = this.#context;
    const { steps, rejected, solves } = march();
    return {
      cells: system.layout.cells,
      tolerance: settings.numerics.tolerance,
      steps,
      rejected,
      newton: solves,
      wall_s: wall,
      charge_defect: this.#numerics.chargeDefect(),
      worst_undershoot: this.#numerics.worstUndershoot,
    };
  }
}
