import type { CrossSectionSet } from '../kinetics/cross-sections.ts';
import type { Measured } from '../kinetics/statistics.ts';
import type { SwarmRequest, SwarmResult } from '../scan/swarm-session.ts';
import { TOWNSEND } from '../units/constants.ts';
import { VERSION } from '../version.ts';
import type { SwarmCaution } from './swarm-cautions.ts';

/** `gapwake.swarm/1` */
export function swarmJson(
  set: CrossSectionSet,
  { setup, accuracy, fields }: SwarmRequest,
  results: readonly SwarmResult[],
  cautions: readonly SwarmCaution[],
): unknown {
  return {
    format: 'gapwake.swarm/1',
    version: VERSION,
    gas: set.name,
    title: set.title,
    source: set.source,
    status: set.status,
    uncertainty: set.uncertainty,
    notes: set.notes,
    processes: set.processes.map(({ kind, name, threshold }) => ({ kind, name, threshold_eV: threshold })),
    energy_range_eV: set.range,
    molecule_kg: set.mass,
    temperature_K: setup.temperature,
    scattering: setup.angular,
    seed: setup.seed,
    accuracy,
    points: results.map((result, i) => pointJson(result, fields[i] ?? 0)),
    cautions,
  };
}

function pointJson(result: SwarmResult, field: number): Record<string, unknown> {
  const point = result.kind === 'point' ? result.point : null;
  const values: Record<string, unknown> = {};
  const add = (name: string, measured: Measured | null | undefined, scale = 1): void => {
    values[name] = measured === null || measured === undefined ? null : measured.value * scale;
    values[`${name}_error`] = measured === null || measured === undefined ? null : measured.error * scale;
  };
  add('mean_energy_eV', point?.meanEnergy);
  add('flux_drift_m_per_s', point?.fluxDrift);
  add('bulk_drift_m_per_s', point?.bulkDrift);
  add('N_D_transverse_per_m_s', point?.transverseDiffusion);
  add('N_D_longitudinal_per_m_s', point?.longitudinalDiffusion);
  add('ionisation_rate_m3_per_s', point?.ionisationRate);
  add('attachment_rate_m3_per_s', point?.attachmentRate);
  add('alpha_over_N_m2', point?.ionisation);
  add('eta_over_N_m2', point?.attachment);
  add('mobility_N_per_m_V_s', point?.fluxDrift, 1 / field);
  add('stream_mean_energy_eV', point === null ? null : (point.streamMeanEnergy ?? point.meanEnergy));
  add('stream_drift_m_per_s', point === null ? null : (point.streamDrift ?? point.fluxDrift));
  add('energy_balance', point?.energyBalance);
  return {
    reduced_field_Td: field / TOWNSEND,
    state: result.kind === 'point' ? 'done' : result.kind,
    ...values,
    rates:
      point?.rates.map(({ name, kind, rate }) => ({ process: kind, name, rate_m3_per_s: rate.value, rate_m3_per_s_error: rate.error })) ??
      null,
    share_above_range: point?.aboveRange ?? null,
    accuracy_reached: result.kind === 'point' ? result.accurate : null,
    batches: point?.batches ?? null,
    collisions: point?.collisions ?? null,
  };
}
