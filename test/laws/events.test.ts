/** Events are located to the error tolerance, not to the step: the same run cut into other steps finds them at the same times. */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import type { GapSystem } from '../../src/march/gap-system.ts';
import { locate } from '../../src/march/locate.ts';
import type { Observer } from '../../src/march/march.ts';
import { caseOf, rightOfMinimum, stepTo } from '../help/plain-gap.ts';
import { rigOf, run } from '../help/rig.ts';
import { printTable } from '../help/table.ts';

describe('locating a root within a step', () => {
  const shapes: readonly (readonly [string, (x: number, r: number) => number])[] = [
    ['straight', (x, r) => 1.7 * (x - r)],
    ['falling', (x, r) => 3 * (r - x)],
    ['bent', (x, r) => (x - r) * (1 + 0.5 * x + 0.3 * x * x)],
    ['steep at its end', (x, r) => Math.exp(12 * x) - Math.exp(12 * r)],
    ['flat at the root', (x, r) => (x - r) ** 3],
    ['with a kink', (x, r) => (x < r ? 0.05 * (x - r) : x - r)],
  ];
  for (const [name, g] of shapes) {
    it(`finds each of 999 roots to 1e-6 of the step for a function that is ${name}`, () => {
      for (let i = 1; i < 1000; i++) {
        const root = i / 1000;
        const found = locate((x) => g(x, root), g(0, root), g(1, root));
        // where the function is flat its value settles before its place does
        const allowed = name === 'flat at the root' ? 2e-3 : 1e-6;
        expect(Math.abs(found - root), `root ${root}`).toBeLessThan(allowed);
      }
    });
  }
});

type Times = Map<string, number>;

/** Times of the events of a run whose steps end at least every `most` [s], found from the states as any observer may. */
function eventsOf(settings: Case, most: number): Times {
  const found: Times = new Map();
  const levels = [1e-7, 1e-5, 1e-3];
  const watch = (system: GapSystem): Observer => ({
    nextTime: (t) => (Math.floor(t / most + 1e-9) + 1) * most,
    look: (step) => {
      const { start, end } = step;
      if (!(end.time > start.time)) return false;
      const scratchCurrent = (t: number, y: Float64Array): number => step.currentOf(t, y);
      for (const level of levels) {
        const name = `current of ${level} A`;
        if (found.has(name) || Math.abs(start.current) >= level || Math.abs(end.current) < level) continue;
        const excess = (current: number): number => Math.log(Math.max(Math.abs(current), 1e-300) / level);
        found.set(
          name,
          step.crossing(excess(start.current), excess(end.current), (t, y) => excess(scratchCurrent(t, y))),
        );
      }
      const V = system.layout.voltage;
      for (const volts of [120, 215]) {
        const name = `voltage of ${volts} V`;
        const [a, b] = [start.y[V] - volts, end.y[V] - volts];
        if (found.has(name) || a * b > 0) continue;
        found.set(
          name,
          step.crossing(a, b, (_t, y) => y[V] - volts),
        );
      }
      if (system.circuit.feed !== feed) found.set(`feed ${feed} → ${system.circuit.feed}`, start.time);
      feed = system.circuit.feed;
      return false;
    },
  });
  let feed = '';
  const rig = rigOf(settings, (system) => {
    feed = system.circuit.feed;
    return [watch(system)];
  });
  run(rig);
  if (rig.march.trip?.excursion) found.set('excursion of the trip', rig.march.trip.excursion);
  return found;
}

const CASES: readonly (readonly [string, Case])[] = [
  [
    'a limited supply with stored charge and a trip',
    caseOf(rightOfMinimum, {
      seed: { cathodeCurrent: 1e-10 },
      supply: {
        programme: stepTo(260),
        seriesResistance: 1e4,
        parallelCapacitance: 300e-12,
        currentLimit: 4e-3,
        trip: { current: 2e-3, delay: 2e-6, senses: 'gap', action: 'open' },
      },
      observe: { until: 6e-5 },
    }),
  ],
  [
    'a ramp behind an ideal supply with a current limit',
    caseOf(rightOfMinimum, {
      seed: { cathodeCurrent: 1e-9 },
      supply: { programme: { kind: 'ramp', from: 0, to: 280, rate: 5e6 }, parallelCapacitance: 50e-12, currentLimit: 1e-3 },
      observe: { until: 9e-5 },
    }),
  ],
];

describe('events', () => {
  for (const [name, settings] of CASES) {
    it(`come at the same times, within 0.2 %, whatever the steps: ${name}`, () => {
      const natural = eventsOf(settings, 1);
      const cut = [3e-6, 0.7e-6].map((most) => eventsOf(settings, most));
      printTable(
        `events of ${name}`,
        ['event', 'natural steps s', 'steps ≤ 3 µs', 'steps ≤ 0.7 µs'],
        [...natural].map(([event, t]) => [event, t, ...cut.map((c) => (c.get(event) ?? Number.NaN) / t - 1)]),
      );
      expect(natural.size).toBeGreaterThanOrEqual(5);
      for (const other of cut) {
        expect([...other.keys()].sort()).toEqual([...natural.keys()].sort());
        for (const [event, t] of natural) expect(Math.abs((other.get(event) ?? Number.NaN) / t - 1), event).toBeLessThan(2e-3);
      }
    });
  }
});
