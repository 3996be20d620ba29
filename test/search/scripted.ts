/** Runs made up for the logic of searches: what a simulation would say, as a function of the case, and what was asked. */
import type { Case } from '../../src/case.ts';
import { MarchFailure } from '../../src/march/march.ts';
import type { Outcome, State, Stop } from '../../src/onset/outcome.ts';
import { largestVoltage } from '../../src/search/scaled.ts';
import { SimulationFailure } from '../../src/simulate.ts';
import { TOWNSEND } from '../../src/units/constants.ts';

export interface Told {
  readonly state: State;
  readonly stop?: Stop;
  readonly reason?: string;
  readonly selfSustaining?: boolean;
  /** [s]; the threshold is passed at t = 0 and the lag ends with space charge */
  readonly lag?: number;
  readonly growth?: number;
  readonly period?: number;
  readonly endsAt?: number;
  readonly peakAt?: number;
  readonly peakCurrent?: number;
  readonly finalVoltage?: number;
  readonly gapEnergy?: number;
  readonly afterTrip?: number;
  /** the first level of observe.currents is crossed then [s] */
  readonly crossesAt?: number;
}

/** An outcome that says what it is told. */
export function outcomeOf(settings: Case, told: Told): Outcome {
  const voltage = largestVoltage(settings.supply);
  const until = settings.observe.until;
  const { lag, period } = told;
  return {
    format: 'gapwake.outcome/1',
    title: settings.title,
    version: '',
    case_sha256: '',
    verdict: { state: told.state, regime: 'dark', self_sustaining: told.selfSustaining ?? false, reason: told.reason ?? 'Told so.' },
    theory: {
      static_breakdown_voltage_V: null,
      upper_breakdown_voltage_V: null,
      lowest_over_paths_V: null,
      paschen_minimum_V: null,
      paschen_minimum_pd_Pa_m: null,
      overvoltage: null,
      pd_Pa_m: 0,
      reduced_field_Td: voltage / (settings.gas.density * settings.gap.spacing) / TOWNSEND,
      alpha_d: 0,
      feedback: 0,
      growth_rate_per_s: null,
      steady_amplification: null,
    },
    onset: {
      threshold_time_s: lag === undefined ? null : 0,
      space_charge_time_s: lag ?? null,
      collapse_time_s: null,
      formative_lag_s: lag ?? null,
      lag_ends_at: lag === undefined ? null : 'space-charge',
      gap_voltage_V: lag === undefined ? null : voltage,
      growth_rate_per_s: told.growth ?? null,
    },
    oscillation: period === undefined ? null : { period_s: period, amplitude_V: 1 },
    peak: { current_A: told.peakCurrent ?? 0, time_s: told.peakAt ?? until, gap_voltage_V: voltage },
    final: {
      time_s: told.endsAt ?? until,
      stop: told.stop ?? 'until',
      gap_voltage_V: told.finalVoltage ?? voltage,
      current_A: 0,
      cathode_field_V_per_m: 0,
      cathode_layer_m: null,
    },
    energy: { gap_J: told.gapEnergy ?? 0, source_J: 0, after_trip_J: told.afterTrip ?? null },
    currents: settings.observe.currents.map((level) => ({ level_A: level, time_s: told.crossesAt ?? null, gap_voltage_V: null })),
    cautions: [],
    numerics: { cells: 0, tolerance: 0, steps: 0, rejected: 0, newton: 0, wall_s: 0, charge_defect: 0, worst_undershoot: 0 },
  };
}

/** A failure at 3 µs in step 7 and cell 5. */
export function failureOf(settings: Case, told: Told = { state: 'undecided' }): SimulationFailure {
  return new SimulationFailure(
    new MarchFailure('no step is small enough', 3e-6, 7, 5),
    'try more',
    outcomeOf(settings, { ...told, stop: 'failed' }),
  );
}

export interface Script {
  readonly simulate: (settings: Case) => Outcome;
  /** values asked for, in order, with what was said */
  readonly asked: { readonly value: number; readonly told: Told | 'fails' }[];
  /** the state told at a value; undefined where nothing was asked */
  stateAt(value: number): State | undefined;
}

/** A simulate function that answers by `tell`. @param searched what is searched */
export function scripted(searched: (settings: Case) => number, tell: (value: number, settings: Case) => Told | 'fails'): Script {
  const asked: { value: number; told: Told | 'fails' }[] = [];
  return {
    asked,
    simulate: (settings) => {
      const value = searched(settings);
      const told = tell(value, settings);
      asked.push({ value, told });
      if (told === 'fails') throw failureOf(settings);
      return outcomeOf(settings, told);
    },
    stateAt: (value) => {
      const told = asked.findLast((a) => a.value === value)?.told;
      return told === undefined || told === 'fails' ? undefined : told.state;
    },
  };
}
