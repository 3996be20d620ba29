/** The books of charge and energy, kept here from the states alone and compared with those of the run. */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import type { GapSystem } from '../../src/march/gap-system.ts';
import type { Observer, Step } from '../../src/march/march.ts';
import { simulateNow } from '../../src/simulate.ts';
import { rigOf } from '../help/rig.ts';
import { SCENARIOS } from '../help/scenarios.ts';
import { printTable } from '../help/table.ts';
import { ELEMENTARY_CHARGE, VACUUM_PERMITTIVITY } from '../oracles/open-case.ts';

/** nodes and weights on [0, 1] of the five-point Gauss–Legendre rule (Abramowitz and Stegun, 1964, table 25.4, from memory) */
const GAUSS: readonly (readonly [number, number])[] = [
  [0.5, 0.2844444444444444],
  [0.2307653449471584, 0.2393143352496832],
  [0.7692346550528415, 0.2393143352496832],
  [0.046910077030668, 0.1184634425280945],
  [0.953089922969332, 0.1184634425280945],
];

interface Books {
  /** largest differences of charge [C] and the charge passed [C] */
  gap: number;
  walls: number;
  circuit: number;
  passed: number;
  /** ∫V I dt and work of the field on the charges [J], by quadrature of the dense output */
  delivered: number;
  work: number;
  /** ½ε0 A ∫E² dx − ½ C_gap V² at the start and now [J] */
  spaceCharge: readonly [number, number];
  /** stored in C_p + C_gap at the start and now, and what switches took out of it [J] */
  stored: readonly [number, number];
}

function follow(settings: Case): { books: Books; energy: { gap: number; source: number; resistor: number } } {
  const books: Books = { gap: 0, walls: 0, circuit: 0, passed: 0, delivered: 0, work: 0, spaceCharge: [0, 0], stored: [0, 0] };
  const keep = (system: GapSystem): Observer => {
    const { layout, grid, equations, circuit, gapCapacitance } = system;
    const scratch = new Float64Array(layout.size);
    const net = (y: Float64Array): number => {
      let sum = 0;
      for (let k = 0; k < layout.species; k++) {
        for (let i = 0; i < layout.cells; i++) sum += equations.charges[k] * grid.widths[i] * y[k * layout.row + layout.first + i];
      }
      return ELEMENTARY_CHARGE * grid.area * sum;
    };
    const flux = (y: Float64Array, f: number): number => VACUUM_PERMITTIVITY * grid.area * y[layout.field + f];
    const fieldEnergy = (y: Float64Array): number => {
      let sum = 0;
      for (let f = 0; f <= layout.cells; f++) sum += grid.faceWeights[f] * y[layout.field + f] ** 2;
      return 0.5 * VACUUM_PERMITTIVITY * grid.area * sum - 0.5 * gapCapacitance * y[layout.voltage] ** 2;
    };
    const stored = (y: Float64Array): number => 0.5 * (circuit.parallelCapacitance + gapCapacitance) * y[layout.voltage] ** 2;
    /** A Σ w E · e Σ q Γ of the state last given to `rates` [W] */
    const power = (y: Float64Array): number => {
      let sum = 0;
      for (let f = 0; f <= layout.cells; f++) sum += grid.faceWeights[f] * y[layout.field + f] * equations.netFlux(f, false);
      return ELEMENTARY_CHARGE * grid.area * sum;
    };
    return {
      look: (step: Step) => {
        const { start, end } = step;
        const span = end.time - start.time;
        if (!(span > 0)) {
          books.spaceCharge = [fieldEnergy(end.y), fieldEnergy(end.y)];
          books.stored = [stored(end.y), stored(end.y)];
          return false;
        }
        const [a, b] = [start.y, end.y];
        const change = (at: number): number => b[at] - a[at];
        const terminal = change(layout.terminalCharge);
        // what is in the gap came through the walls
        const left = change(layout.leftWallCharge);
        const right = change(layout.rightWallCharge);
        books.gap = Math.max(books.gap, Math.abs(net(b) - net(a) - (left - right)));
        // the terminal current is conduction and displacement at either wall
        books.walls = Math.max(
          books.walls,
          Math.abs(terminal + flux(b, 0) - flux(a, 0) + left),
          Math.abs(terminal + flux(b, layout.cells) - flux(a, layout.cells) + right),
        );
        // the supply feeds the gap and the capacitance beside it
        const charged = circuit.parallelCapacitance * change(layout.voltage);
        books.circuit = Math.max(books.circuit, Math.abs(change(layout.supplyCharge) - terminal - charged));
        books.passed += Math.abs(terminal) + Math.abs(change(layout.supplyCharge));
        for (const [node, weight] of GAUSS) {
          const t = start.time + node * span;
          step.stateAt(t, scratch);
          const current = step.currentOf(t, scratch);
          books.delivered += weight * span * scratch[layout.voltage] * current;
          books.work += weight * span * power(scratch);
        }
        books.spaceCharge = [books.spaceCharge[0], fieldEnergy(b)];
        books.stored = [books.stored[0], stored(b)];
        return false;
      },
    };
  };
  const rig = rigOf(settings, (system) => [keep(system)]);
  while (!rig.march.done) {
    rig.march.advance();
    // a switch behind an ideal supply may move the voltage at once: the capacitances then jump too
    const { layout, capacitance } = rig.system;
    const now = 0.5 * capacitance * rig.march.state[layout.voltage] ** 2;
    books.stored = [books.stored[0] + now - books.stored[1], now];
  }
  const { gap, source, resistor } = rig.energy;
  return { books, energy: { gap, source, resistor } };
}

describe('charge and energy', () => {
  const rows: (string | number)[][] = [];
  for (const [name, settings] of SCENARIOS) {
    describe(`along ${name}`, () => {
      const { books, energy } = follow(settings);
      const balance = energy.source - energy.resistor - energy.gap - (books.stored[1] - books.stored[0]);
      const throughput = Math.abs(energy.source) + Math.abs(energy.gap);
      rows.push([
        name,
        books.gap / books.passed,
        books.walls / books.passed,
        books.circuit / books.passed,
        balance / throughput,
        books.delivered / energy.gap - 1,
      ]);

      it('balance to 1e-9 of the charge passed in the gap, at both walls and in the circuit', () => {
        expect(books.gap).toBeLessThan(1e-9 * books.passed);
        expect(books.walls).toBeLessThan(1e-9 * books.passed);
        expect(books.circuit).toBeLessThan(1e-9 * books.passed);
      });

      it('balance to 1e-6 of the energy: source = resistor + gap + change of ½(C_p + C_gap)V²', () => {
        expect(Math.abs(balance)).toBeLessThan(1e-6 * throughput);
      });

      it('agree with ∫V I dt, and with the work of the field on the charges, by quadrature of the dense output within 0.2 %', () => {
        expect(Math.abs(books.delivered - energy.gap)).toBeLessThan(2e-3 * Math.abs(energy.gap));
        const grown = books.spaceCharge[1] - books.spaceCharge[0];
        expect(Math.abs(books.work + grown - energy.gap)).toBeLessThan(2e-3 * Math.abs(energy.gap));
      });

      it('are what the outcome reports', () => {
        const outcome = simulateNow(settings);
        expect(outcome.numerics.charge_defect).toBeLessThan(1e-9);
        // the outcome's run takes other steps (its analysis asks for some), and may end early when steady: it then has not fed the rest
        const ended = outcome.final.stop === 'until';
        const share = (reported: number, followed: number): number => reported / followed - 1;
        if (ended) expect(Math.abs(share(outcome.energy.source_J, energy.source))).toBeLessThan(5e-3);
        if (ended) expect(Math.abs(share(outcome.energy.gap_J, energy.gap))).toBeLessThan(5e-3);
        else expect(share(outcome.energy.gap_J, energy.gap)).toBeLessThan(5e-3);
      });
    });
  }

  it('print their defects', () => {
    printTable('balances', ['', 'gap', 'walls', 'circuit', 'energy', '∫VI dt'], rows);
    expect(rows.length).toBe(SCENARIOS.length);
  });
});
