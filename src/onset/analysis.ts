import type { Observer, Step } from '../march/march.ts';
import { cathodeLayer } from '../observables/cathode-layer.ts';
import { cathodeDistortion, cathodeField } from '../observables/walls.ts';
import { predict, prospects } from '../theory/predict.ts';
import { VERSION } from '../version.ts';
import { cautionsOf } from './cautions.ts';
import { distortionFloor, type RunContext } from './context.ts';
import { EnergyWatch } from './energy-watch.ts';
import { EventWatch } from './event-watch.ts';
import { GrowthWatch } from './growth-watch.ts';
import { judge } from './judge.ts';
import { NumericsWatch } from './numerics-watch.ts';
import { oscillationOf } from './oscillation.ts';
import type { Onset, Outcome, Stop } from './outcome.ts';
import { RangeWatch } from './range-watch.ts';
import { type Snapshot, SnapshotWatch } from './snapshot-watch.ts';
import { SustainWatch } from './sustain-watch.ts';

/** Who takes the snapshots of a run. */
interface Takers {
  begin?(layout: { readonly x: Float64Array; readonly negativeIons: boolean }): void;
  snapshot?(s: Snapshot): void;
}

/** Watches a march and, at its end, says what happened. */
export class Analysis {
  readonly observers: readonly Observer[];
  readonly #context: RunContext;
  readonly #events: EventWatch;
  readonly #sustain: SustainWatch;
  readonly #growth: GrowthWatch;
  readonly #energy: EnergyWatch;
  readonly #numerics: NumericsWatch;
  readonly #range: RangeWatch;
  readonly #snapshots: SnapshotWatch | null;
  #lastStep: Step | null = null;
  #largestCathodeField = 0;
  #tripTime: number | null = null;
  #tripCurrents: { conduction: number; supply: number } | null = null;
  #gapEnergyAtTrip: number | null = null;

  constructor(context: RunContext, initial: Float64Array, takers: Takers) {
    const { system, settings } = context;
    this.#context = context;
    this.#events = new EventWatch(context);
    this.#sustain = new SustainWatch(context);
    this.#growth = new GrowthWatch(
      system,
      context.ionTransit,
      distortionFloor(context, system.circuit.supplyVoltage(settings.observe.until)),
    );
    this.#energy = new EnergyWatch(system);
    this.#numerics = new NumericsWatch(system, this.#energy, initial);
    this.#range = new RangeWatch(system, settings.gas.coefficients);
    takers.begin?.({ x: system.grid.centres, negativeIons: system.equations.charges.length > 2 });
    const take = takers.snapshot?.bind(takers);
    this.#snapshots = take ? new SnapshotWatch(system, this.#energy, take) : null;
    const own: Observer = { look: (step) => this.#look(step) };
    this.observers = [
      this.#energy,
      this.#numerics,
      this.#range,
      this.#events,
      this.#growth,
      ...(this.#snapshots ? [this.#snapshots] : []),
      own,
      this.#sustain,
    ];
  }

  #look(step: Step): boolean {
    this.#lastStep = step;
    const { system } = this.#context;
    this.#largestCathodeField = Math.max(this.#largestCathodeField, cathodeField(system.layout, step.end.y));
    const { trip } = this.#context.march();
    if (trip && step.end.time >= trip.actsAt && this.#tripTime === null) {
      this.#tripTime = step.end.time;
      this.#tripCurrents = { conduction: step.end.current, supply: step.end.supplyCurrent };
      this.#gapEnergyAtTrip = this.#energy.gap;
    }
    return false;
  }

  /** The outcome at the end of the march.
   *  @param forced a stop from outside the march: interrupted or failed
   *  @param wall wall time of the run [s] */
  conclude(forced: Stop | null, wall: number): Outcome {
    const { settings, system } = this.#context;
    const march = this.#context.march();
    const { layout } = system;
    const now = march.now;
    const V = now.y[layout.voltage];
    const step = this.#lastStep;
    if (step) this.#snapshots?.finish(step);
    const q = this.#context.feedback(V);
    const stop: Stop = forced ?? this.#sustain.stopsAs(now.time, q) ?? 'until';

    const largest = this.#events.largestOpenGap;
    const sign = this.#events.largestOpenGapSign || 1;
    const theory = predict(settings, sign * largest);
    const outlook = prospects(settings, sign * largest);
    const onset = this.#onset();
    const layer = cathodeLayer(system.grid, layout, now.y);
    const lagEnd = this.#events.lagEnd;
    const range = settings.gas.coefficients.ionisation.range;
    const xs = outlook.breakdownReducedField;
    const current = Math.abs(now.current);
    const verdict = judge({
      brokeDown: this.#sustain.brokeDown,
      selfSustaining: this.#sustain.selfSustaining,
      distortedNow: this.#sustain.distortedNow,
      largestDistortion: this.#events.largestDistortion,
      arcRisk: this.#sustain.arcRisk,
      stop,
      time: now.time,
      current,
      voltage: V,
      largestOpenGap: largest,
      largestGapVoltage: this.#events.largestGapVoltage,
      feedback: q,
      growthOverTransit: this.#sustain.growthOverTransit(now.time, now.current),
      ionTransit: this.#context.ionTransit,
      distortionNow: cathodeDistortion(layout, settings.gap.spacing, distortionFloor(this.#context, V), now.y),
      spaceChargeTime: onset.space_charge_time_s,
      lag: lagEnd === null || onset.formative_lag_s === null ? null : { value: onset.formative_lag_s, kind: lagEnd.kind },
      lagVoltage: onset.gap_voltage_V,
      aboveThreshold: this.#events.aboveThreshold,
      currentAtThreshold: this.#sustain.currentAtThreshold,
      peakCurrent: this.#events.peak.current,
      tripTime: this.#tripTime,
      trippedByCharging:
        this.#tripCurrents !== null && Math.abs(this.#tripCurrents.conduction) < 0.01 * Math.abs(this.#tripCurrents.supply),
      thresholdOutsideData: xs !== null && range !== null && (xs < range.from || xs > range.to),
      breakdownUncertainty: settings.gas.breakdownUncertainty,
      theory,
      lowestPath: outlook.lowestPath,
      seedLowers: this.#sustain.brokeDown && onset.threshold_time_s === null,
    });
    const cautions = cautionsOf(settings, sign * largest, theory, outlook, {
      broken: verdict.state === 'breaks-down',
      held: verdict.state === 'holds',
      arcRisk: this.#sustain.arcRisk,
      thresholdTime: onset.threshold_time_s,
      lag: onset.formative_lag_s,
      growthRate: onset.growth_rate_per_s,
      electronTransit: this.#context.electronTransit,
      steadyGlow: stop === 'steady' && this.#sustain.distortedNow && this.#sustain.selfSustaining,
      currentDensity: current / settings.gap.area,
      largestCathodeField: this.#largestCathodeField,
      outside: this.#range.shares(),
      seedDrop: largest > 0 && system.circuit.feed === 'resistor' ? (current * system.circuit.resistance) / largest : 0,
      layerCells: layer === null ? null : layer.cells,
      undershoot: this.#numerics.worstUndershoot,
    });
    return {
      format: 'gapwake.outcome/1',
      title: settings.title,
      version: VERSION,
      case_sha256: settings.sha256,
      verdict,
      theory,
      onset,
      oscillation: oscillationOf(this.#events.extremes, largest, now.time),
      peak: { current_A: this.#events.peak.current, time_s: this.#events.peak.time, gap_voltage_V: this.#events.peak.voltage },
      final: {
        time_s: now.time,
        stop,
        gap_voltage_V: V,
        current_A: now.current,
        cathode_field_V_per_m: Math.abs(cathodeField(layout, now.y)),
        cathode_layer_m: layer?.thickness ?? null,
      },
      energy: {
        gap_J: this.#energy.gap,
        source_J: this.#energy.source,
        after_trip_J: this.#gapEnergyAtTrip === null ? null : this.#energy.gap - this.#gapEnergyAtTrip,
      },
      currents: this.#events.levels.map((l) => ({ level_A: l.level, time_s: l.time, gap_voltage_V: l.voltage })),
      cautions,
      numerics: {
        cells: layout.cells,
        tolerance: settings.numerics.tolerance,
        steps: march.steps,
        rejected: march.rejected,
        newton: march.solves,
        wall_s: wall,
        charge_defect: this.#numerics.chargeDefect(),
        worst_undershoot: this.#numerics.worstUndershoot,
      },
    };
  }

  #onset(): Onset {
    const events = this.#events;
    const end = events.lagEnd;
    const space = events.spaceCharge;
    return {
      threshold_time_s: events.thresholdTime,
      space_charge_time_s: space?.time ?? null,
      collapse_time_s: events.collapseTime,
      formative_lag_s: end === null || events.thresholdTime === null ? null : end.time - events.thresholdTime,
      lag_ends_at: end?.kind ?? null,
      gap_voltage_V: end?.voltage ?? null,
      growth_rate_per_s: this.#growth.rate(),
    };
  }
}
