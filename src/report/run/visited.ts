import type { Profiles } from './data.ts';
import type { RunReport } from './report.ts';

/** Which reduced fields a run used a coefficient at, and how much of that use lies inside the range of its data. */
export interface Visited {
  /** E/N [V m²] between which all but a thousandth of the use lies */
  readonly from: number;
  readonly to: number;
  /** share of the use inside the stated range; null where none is stated */
  readonly inside: number | null;
}

/** What measures the use of each coefficient: ionisation made for the coefficients that make it, else the number of particles that move. */
const WEIGHTS: Readonly<Record<string, 'ionisationRate' | 'electronFlux' | 'ionFlux' | 'negativeIonFlux'>> = {
  ionisation: 'ionisationRate',
  attachment: 'electronFlux',
  electron_mobility: 'electronFlux',
  electron_energy: 'electronFlux',
  ion_mobility: 'ionFlux',
  ion_energy: 'ionFlux',
  negative_ion_mobility: 'negativeIonFlux',
  negative_ion_energy: 'negativeIonFlux',
  electron_ion_recombination: 'electronFlux',
  ion_ion_recombination: 'negativeIonFlux',
};

const BINS = 600;
/** E/N covered [V m²]: 1e-4 Td to 1e6 Td */
const [LOWEST, HIGHEST] = [1e-25, 1e-15];

/** The use of the named coefficient over the snapshots: |weight| times the time and the length that each stands for, against E/N.
 *  Null where it was not used, or the density of the gas is not known. */
export function visited(name: string, range: { readonly from: number; readonly to: number } | null, run: RunReport): Visited | null {
  const field = WEIGHTS[name];
  const weight = field === undefined ? null : run.fields[field];
  const { electricField } = run.fields;
  const density = run.settings?.gas.density;
  if (weight === null || electricField === null || density === undefined || run.x.length === 0) return null;
  const bins = new Float64Array(BINS);
  let whole = 0;
  let inside = 0;
  forEachUse(run, weight, electricField, (use, strength) => {
    const reduced = strength / density;
    whole += use;
    if (range !== null && reduced >= range.from && reduced <= range.to) inside += use;
    const place = (Math.log(Math.max(reduced, LOWEST) / LOWEST) / Math.log(HIGHEST / LOWEST)) * BINS;
    bins[Math.min(BINS - 1, Math.max(0, Math.floor(place)))] += use;
  });
  if (!(whole > 0)) return null;
  const edge = (bin: number): number => LOWEST * (HIGHEST / LOWEST) ** (bin / BINS);
  let [low, high] = [0, BINS];
  for (let sum = bins[0]; sum < 5e-4 * whole; sum += bins[low]) low++;
  for (let sum = bins[BINS - 1]; sum < 5e-4 * whole; sum += bins[high - 1]) high--;
  return { from: edge(low), to: edge(high), inside: range === null ? null : inside / whole };
}

/** Each cell of each snapshot: |weight| times the time it stands for (half of the steps beside it) and its length. */
function forEachUse({ time, x }: RunReport, weight: Profiles, field: Profiles, use: (amount: number, strength: number) => void): void {
  const cells = x.length;
  const half = (values: Float64Array, i: number): number =>
    ((values[Math.min(i + 1, values.length - 1)] ?? 0) - (values[Math.max(i - 1, 0)] ?? 0)) / 2;
  for (let i = 0; i < time.length; i++) {
    const duration = half(time, i);
    for (let k = 0; k < cells; k++) {
      const amount = Math.abs(weight[i * cells + k]) * duration * half(x, k);
      if (amount > 0 && Number.isFinite(amount)) use(amount, Math.abs(field[i * cells + k]));
    }
  }
}
