import { airBreakdown } from '../help/measured.ts';
import { type Check, type Source, within } from './check.ts';

/** V = 24.22 x + 6.08 √x kV, x = 293 p d/(760 T), p in Torr, d in cm */
const formula = (pd: number): number => 24220 * (pd / 760) + 6080 * Math.sqrt(pd / 760);

const row = (pd: number, slow: boolean): Check => ({
  check: `air, 1 cm at ${pd} Torr, 20 °C: breakdown voltage`,
  published: Number(formula(pd).toPrecision(5)),
  unit: 'V',
  allowed: within(0.12),
  reason:
    'α and η of air known to 20 and 30 %: at high pd V follows the field where they nearly balance; three-body attachment and detachment left out',
  status: 'second-hand',
  independentOf: 'the formula: α and η from swarms, no breakdown criterion',
  simulated: true,
  ...(slow ? { slow: true as const } : {}),
  compute: () => airBreakdown(pd, 0.93 * formula(pd)),
});

export const uniformFieldAir: Source = {
  source: 'Uniform-field air, V = 24.22 x + 6.08 √x kV: Bruce 1947 (from memory, M), as given by Kuffel et al., ch. 5',
  checks: [row(3, false), row(10, false), row(30, true), row(76, true), row(200, true), row(760, true)],
};
