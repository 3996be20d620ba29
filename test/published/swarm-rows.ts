/** Published numbers of electrons in a uniform field against the particle engine. */
import type { CrossSectionSet } from '../../src/kinetics/cross-sections.ts';
import type { Measured } from '../../src/kinetics/statistics.ts';
import type { SwarmPoint } from '../../src/kinetics/swarm.ts';
import { swarmPoint } from '../help/swarm-point.ts';
import { type Check, type PublishedStatus, within } from './check.ts';

export interface SwarmRow {
  /** E/N [Td], molecules at rest */
  readonly at: number;
  readonly quantity: 'meanEnergy' | 'fluxDrift' | 'transverseDiffusion' | 'longitudinalDiffusion';
  readonly published: number;
  readonly share: number;
  readonly reason: string;
  readonly status: PublishedStatus;
  readonly independentOf: string;
}

const NAMES = {
  meanEnergy: ['mean energy', 'eV'],
  fluxDrift: ['drift velocity', 'm/s'],
  transverseDiffusion: ['N D across the field', '1/(m s)'],
  longitudinalDiffusion: ['N D along the field', '1/(m s)'],
} as const;

/** Rows of one gas; rows at one field share its simulation. */
export function swarmRows(set: CrossSectionSet, batches: number, flights: number, rows: readonly SwarmRow[]): Check[] {
  const points = new Map<number, SwarmPoint>();
  const pointAt = (td: number): SwarmPoint => {
    const known = points.get(td);
    if (known !== undefined) return known;
    const point = swarmPoint(set, 0, td, batches, flights);
    points.set(td, point);
    return point;
  };
  return rows.map(({ at, quantity, published, share, reason, status, independentOf }) => {
    const [name, unit] = NAMES[quantity];
    return {
      check: `${set.title} at ${at} Td: ${name}`,
      published,
      unit,
      allowed: within(share),
      reason,
      status,
      independentOf,
      simulated: false,
      slow: true,
      compute: () => {
        const { value, error }: Measured = pointAt(at)[quantity];
        // a value that noise could put anywhere in the band would say nothing
        if (!(error < (share / 2) * published)) throw new Error(`its standard error is ${error}`);
        return value;
      },
    };
  });
}
