/** When electrons are looked at again as particles during a run. */
import { describe, expect, it } from 'vitest';
import { makeGrid } from '../../src/gap/grid.ts';
import { makeLayout } from '../../src/gap/layout.ts';
import { collisionsOf } from '../../src/kinetics/of-case.ts';
import { FastElectrons } from '../../src/laws/fast-electrons.ts';
import { type ParticleSettings, Particles } from '../../src/march/particles.ts';
import { thinCase } from './thin-case.ts';

/** A gap of 40 cells with particles, and its state with a field of −(V/d)(1 + tilt (1 − 2x/d)), which is V whatever the tilt. */
function gapOf(particles: number) {
  const settings = thinCase();
  const grid = makeGrid(settings.gap, 40, { left: true, right: false, length: 1e-3, ratio: 3 });
  const layout = makeLayout(grid.cells, 2);
  const fast = new FastElectrons(grid);
  let asked = 0;
  const uniform: ParticleSettings['uniform'] = () => {
    asked++;
    return { ions: new Float64Array(10).fill(1), slow: new Float64Array(10).fill(0.1), returned: 0.2, error: 0.01, byVoltage: 5 };
  };
  const particleSettings = {
    table: collisionsOf(settings),
    emissionEnergy: 2,
    particles,
    seed: 1,
    emission: 0.1,
    ionTransit: 1e-6,
    uniform,
  };
  const looks = new Particles(particleSettings, fast, grid, layout);
  const state = (V: number, tilt: number): Float64Array => {
    const y = new Float64Array(layout.size);
    y[layout.voltage] = V;
    for (let f = 0; f <= grid.cells; f++) {
      y[layout.field + f] = -(V / grid.spacing) * (1 + tilt * (1 - (2 * grid.faces[f]) / grid.spacing));
    }
    return y;
  };
  return { grid, fast, looks, state, asked: () => asked };
}

describe('looks at particles', () => {
  it('take the answers of the gap without space charge as long as its field is uniform to a per cent', () => {
    const { looks, state, asked } = gapOf(640);
    expect(looks.look(0, state(200, 0.005))).toBe(true);
    expect([asked(), looks.looks]).toEqual([1, 0]);
    expect(looks.error).toBeCloseTo(0.01, 12);
    expect(looks.look(1e-6, state(230, 0))).toBe(true);
    expect([asked(), looks.looks]).toEqual([2, 0]);
  });

  it('are due once the voltage or the field has changed by 3 % and not before, and a step must not go half as far again', () => {
    const { looks, state } = gapOf(640);
    looks.look(0, state(200, 0));
    for (const small of [state(204, 0), state(196, 0), state(200, 0.02)]) expect(looks.look(1e-9, small)).toBe(false);
    expect(looks.overreach(state(204, 0))).toBeLessThan(1);
    expect(looks.overreach(state(212, 0))).toBeGreaterThan(1);
    expect(looks.change(state(200, 0.1))).toBeCloseTo(0.1, 12);
    expect(looks.change(state(150, 0))).toBeCloseTo(0.25, 12);
    expect(looks.look(1e-9, state(200, 0.05))).toBe(true);
    expect(looks.looks).toBe(1);
  });

  it('know less after a change of the field than before, and more after more electrons at rest', () => {
    const { looks, state } = gapOf(6400);
    looks.look(0, state(200, 0));
    looks.look(1e-9, state(200, 0.05));
    const moved = looks.error;
    expect(moved).toBeGreaterThan(0.01);
    // hardly any change over many ion transits: followed again until all electrons have been
    let more = 0;
    for (let k = 1; k < 40 && looks.look(k * 1e-4, state(200, 0.05)); k++) more++;
    expect(more).toBeGreaterThan(1);
    expect(more).toBeLessThan(8);
    expect(looks.error).toBeLessThan(0.7 * moved);
  });

  it('never happen below the voltage that ionises at all', () => {
    const { looks, state } = gapOf(640);
    looks.look(0, state(0, 0));
    expect(looks.look(1e-6, state(13, 0))).toBe(false);
    expect(looks.look(1e-6, state(16, 0))).toBe(true);
  });
});
