/** Conduction plus displacement current is the same at every x (Maxwell: its divergence vanishes). */
import { describe, expect, it } from 'vitest';
import type { GapSystem } from '../../src/march/gap-system.ts';
import type { Observer } from '../../src/march/march.ts';
import { rigOf, run } from '../help/rig.ts';
import { SCENARIOS } from '../help/scenarios.ts';
import { ELEMENTARY_CHARGE, VACUUM_PERMITTIVITY } from '../oracles/open-case.ts';

/** How much ε0 A ∂E/∂t + e A Σ q Γ differs between the faces, and from what the circuit carries away, −(I + C_gap dV/dt) [A], from the rates
 *  of the equations at a state; and |E| at most. */
function spread(system: GapSystem, time: number, state: Float64Array): { spread: number; total: number; field: number } {
  const { layout, grid, equations } = system;
  const y = state.slice();
  const rates = new Float64Array(layout.size);
  system.rates(time, y, rates);
  let fieldRate = rates[layout.leftField];
  const atTerminals = -(system.current + system.gapCapacitance * rates[layout.voltage]);
  let least = atTerminals;
  let most = atTerminals;
  let field = 0;
  for (let f = 0; f <= layout.cells; f++) {
    const current = grid.area * (VACUUM_PERMITTIVITY * fieldRate + ELEMENTARY_CHARGE * equations.netFlux(f, false));
    least = Math.min(least, current);
    most = Math.max(most, current);
    field = Math.max(field, Math.abs(y[layout.field + f]));
    if (f === layout.cells) break;
    let charge = 0;
    for (let k = 0; k < layout.species; k++) charge += equations.charges[k] * rates[k * layout.row + layout.first + f];
    fieldRate += (ELEMENTARY_CHARGE / VACUUM_PERMITTIVITY) * grid.widths[f] * charge;
  }
  return { spread: most - least, total: Math.max(Math.abs(most), Math.abs(least)), field };
}

describe('the total current', () => {
  for (const [name, settings] of SCENARIOS) {
    it(`is the same at every x and at the terminals, to 1e-9 of it and rounding, along ${name}`, () => {
      let steps = 0;
      const watch = (system: GapSystem): Observer => ({
        look: ({ start, end }) => {
          const span = end.time - start.time;
          if (!(span > 0) || ++steps % 3 !== 0) return false;
          const { spread: off, total, field } = spread(system, end.time, end.y);
          const rounding = (1000 * 2 ** -52 * VACUUM_PERMITTIVITY * system.grid.area * field) / span;
          expect(off, `at ${end.time} s`).toBeLessThan(1e-9 * total + rounding);
          return false;
        },
      });
      run(rigOf(settings, (system) => [watch(system)]));
      expect(steps).toBeGreaterThan(40);
    });
  }
});
