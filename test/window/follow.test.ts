/** Windows of gaps whose hold-off voltage is a closed form: where the edges must lie is known from that form alone. */
import { describe, expect, it } from 'vitest';
import type { Case } from '../../src/case.ts';
import { followWindow, type WindowAnswer } from '../../src/search/window/follow.ts';
import type { State } from '../../src/search/window/states.ts';
import type { WindowSettings } from '../../src/study.ts';
import { FLOW_GASES } from '../../src/surroundings/flow-gas.ts';
import {
  type Analytic,
  analytic,
  closedForm,
  densityAt,
  minimum,
  paschenCase,
  pressureOf,
  SPACING,
  TEMPERATURE,
  type Yields,
} from './paschen.ts';

const one: Yields = { low: 0.01, typical: 0.01, high: 0.01 };
const spread: Yields = { low: 0.003, typical: 0.01, high: 0.05 };
const HOURS = 3;
const T = HOURS * 3600;

/** A history of straight pieces in ln p: [time, density] */
function pressures(points: readonly (readonly [number, number])[], temperature = TEMPERATURE): WindowSettings['history'] {
  const times: number[] = [];
  const values: number[] = [];
  for (const [k, [t, N]] of points.entries()) {
    if (k === 0) {
      times.push(t);
      values.push(pressureOf(N));
      continue;
    }
    const [before, from] = points[k - 1];
    for (let i = 1; i <= 200; i++) {
      times.push(before + ((t - before) * i) / 200);
      values.push(pressureOf(from * (N / from) ** (i / 200)));
    }
  }
  return { duration: times[times.length - 1], pressure: { kind: 'table', rows: { times, values } }, temperature };
}

/** time at which a density is passed on a straight piece in ln p */
function passing(N: number, [t0, N0]: readonly [number, number], [t1, N1]: readonly [number, number]): number {
  return t0 + ((t1 - t0) * Math.log(N / N0)) / Math.log(N1 / N0);
}

async function follow(settings: Case, window: WindowSettings, world: Analytic): Promise<WindowAnswer> {
  return followWindow(settings, window, { evaluate: world.evaluate });
}

const windows = (answer: { windows: WindowAnswer['windows'] }, state: State): (readonly [number, number])[] =>
  answer.windows.filter((w) => w.state === state).map(({ from, to }) => [from, to] as const);

/** Every edge within 0.5 % of the duration, and the window not shorter than it is. */
function expectWindow([from, to]: readonly [number, number], exactFrom: number, exactTo: number, duration: number): void {
  expect(Math.abs(from - exactFrom)).toBeLessThan(5e-3 * duration);
  expect(Math.abs(to - exactTo)).toBeLessThan(5e-3 * duration);
  expect(from).toBeLessThanOrEqual(exactFrom + 1e-3 * duration);
  expect(to).toBeGreaterThanOrEqual(exactTo - 1e-3 * duration);
}

const bottom = minimum(one.typical).column / SPACING;
const start = [0, 300 * bottom] as const;

describe('a pressure that falls through the Paschen minimum', () => {
  const end = [T, 0.3 * bottom] as const;
  const history = pressures([start, end]);
  const right = passing(densityAt(400, one.typical, 'right'), start, end);
  const left = passing(densityAt(400, one.typical, 'left'), start, end);

  it.each([
    ['as theory has it', (): number => 1],
    ['a tenth lower than theory has it', (): number => 0.9],
    ['lower by more the denser the gas is', (N: number): number => 0.97 * (N / bottom) ** -0.01],
  ])('breaks down between both branches, with a hold-off %s', async (_, ratio) => {
    const world = analytic(one, ratio);
    const answer = await follow(paschenCase(one), { history, voltage: 400, margin: 1.5 }, world);
    const at = (branch: 'left' | 'right', voltage: number): number => {
      // 20 fixed-point steps: the ratio hardly depends on the density
      let N = densityAt(voltage, one.typical, branch);
      for (let k = 0; k < 20; k++) N = densityAt(voltage / ratio(N), one.typical, branch);
      return passing(N, start, end);
    };
    const [broken, ...others] = windows(answer, 'breaks-down');
    expect(others).toEqual([]);
    expectWindow(broken, at('right', 400), at('left', 400), T);
    const marginal = windows(answer, 'marginal');
    expectWindow(marginal[0], at('right', 600), at('right', 400), T);
    expect(Math.abs((answer.latest ?? 0) - at('right', 600))).toBeLessThan(5e-3 * T);
    expect(answer.latest).toBeLessThanOrEqual(at('right', 600));
    expect(answer.earliest).toBeNull(); // it ends where no voltage breaks down: outside the model
    expect(answer.windows.at(-1)?.state).toBe('outside-model');
  });

  it('has its lowest hold-off voltage at the minimum, to 0.1 %, within 1 % of the time', async () => {
    const answer = await follow(paschenCase(one), { history, voltage: 400, margin: 1.5 }, analytic(one));
    const lowest = minimum(one.typical);
    expect(Math.abs((answer.lowest?.holdOff ?? 0) / lowest.voltage - 1)).toBeLessThan(1e-3);
    expect(Math.abs((answer.lowest?.time ?? 0) - passing(bottom, start, end))).toBeLessThan(1e-2 * T);
  });

  it('is worst, and fastest to break down, at the minimum', async () => {
    const answer = await follow(paschenCase(one), { history, voltage: 400, margin: 1.5 }, analytic(one));
    const worst = answer.worst === null ? null : answer.instants[answer.worst];
    expect(worst?.time).toBe(answer.lowest?.time);
    const [window] = answer.windows.filter((w) => w.state === 'breaks-down');
    // the evaluator's lag: 10 µs over the overvoltage
    const over = 400 / minimum(one.typical).voltage - 1;
    expect(Math.abs((window.shortestLag ?? 0) / (1e-5 / over) - 1)).toBeLessThan(1e-2);
    expect(worst?.lag).toBe(window.shortestLag);
  });

  it('holds below the minimum throughout, with the margin, and counts vacuum as holding', async () => {
    const low = 0.6 * minimum(one.typical).voltage;
    const answer = await follow(paschenCase(one), { history, voltage: low, margin: 1.5 }, analytic(one));
    expect(windows(answer, 'breaks-down')).toEqual([]);
    expect(windows(answer, 'marginal')).toEqual([]);
    expect(answer.windows.map(({ state, safe }) => [state, safe])).toEqual([['outside-model', true]]);
    expect(answer.earliest).toBe(0);
    expect(answer.latest).toBe(T);
  });

  it('does not hold in vacuum above the minimum over the margin', async () => {
    const low = 0.7 * minimum(one.typical).voltage; // 1.05 with the margin
    const answer = await follow(paschenCase(one), { history, voltage: low, margin: 1.5 }, analytic(one));
    expect(answer.windows.at(-1)).toMatchObject({ state: 'outside-model', safe: false, to: T });
    expect(answer.earliest).toBeNull();
  });

  it('breaks down as it does at 400 V with its sign reversed', async () => {
    const up = await follow(paschenCase(one), { history, voltage: 400, margin: 1.5 }, analytic(one));
    const down = await follow(paschenCase(one), { history, voltage: -400, margin: 1.5 }, analytic(one));
    expect(down.windows).toEqual(up.windows);
  });

  it('asks for few simulations, in few rounds, and simulates every hold-off voltage it states', async () => {
    const world = analytic(one);
    const answer = await follow(paschenCase(one), { history, voltage: 400, margin: 1.5 }, world);
    expect(world.asked.filter(({ kind }) => kind === 'hold-off').length).toBeLessThan(60);
    expect(world.rounds.length).toBeLessThan(8);
    const simulated = new Set(world.asked.map(({ density }) => density));
    for (const { holdOff, pressure } of answer.instants) {
      if (holdOff !== null) expect(simulated).toContain(Number((pressure / pressureOf(1)).toPrecision(5)));
    }
    expect(right).toBeLessThan(left);
  });
});

describe('a pressure that passes the minimum twice', () => {
  it('has two windows of breakdown, or more, and turn-on holds only outside them', async () => {
    const points = [
      [0, 100 * bottom],
      [1000, 0.9 * bottom],
      [2000, 100 * bottom],
      [3000, 0.9 * bottom],
      [4000, 300 * bottom],
    ] as const;
    const world = analytic(one);
    const answer = await follow(paschenCase(one), { history: pressures(points), voltage: 300, margin: 1.2 }, world);
    const N = densityAt(300, one.typical, 'right');
    const edges = [1, 2, 3, 4].map((k) => passing(N, points[k - 1], points[k]));
    const broken = windows(answer, 'breaks-down');
    expect(broken).toHaveLength(2);
    expectWindow(broken[0], edges[0], edges[1], 4000);
    expectWindow(broken[1], edges[2], edges[3], 4000);
    const wanted = densityAt(360, one.typical, 'right');
    expect(Math.abs((answer.earliest ?? 0) - passing(wanted, points[3], points[4]))).toBeLessThan(20);
    expect(Math.abs((answer.latest ?? 0) - passing(wanted, points[0], points[1]))).toBeLessThan(20);
  });

  it('may pass it in a second of three hours without being missed', async () => {
    // down to the minimum and back within two seconds
    const points = [
      [0, 100 * bottom],
      [4321, 100 * bottom],
      [4322, 1.0 * bottom],
      [4323, 100 * bottom],
      [T, 100 * bottom],
    ] as const;
    const answer = await follow(paschenCase(one), { history: pressures(points), voltage: 300, margin: 1 }, analytic(one));
    const N = densityAt(300, one.typical, 'right');
    const [[from, to], ...others] = windows(answer, 'breaks-down');
    expect(others).toEqual([]);
    const [opens, closes] = [passing(N, points[1], points[2]), passing(N, points[2], points[3])];
    // to a fifth of its own length
    expect(Math.abs(from - opens)).toBeLessThan(0.2 * (closes - opens));
    expect(Math.abs(to - closes)).toBeLessThan(0.2 * (closes - opens));
    expect(Math.abs((answer.lowest?.holdOff ?? 0) / minimum(one.typical).voltage - 1)).toBeLessThan(2e-3);
  });
});

describe('a short dip below the hold-off voltage', () => {
  it('has edges known to a fifth of its own length, not of the history', async () => {
    const N = densityAt(300, one.typical, 'right');
    const points = [
      [0, 1.15 * N],
      [4321, 1.15 * N],
      [4331, 0.85 * N],
      [4341, 1.15 * N],
      [T, 1.15 * N],
    ] as const;
    const answer = await follow(paschenCase(one), { history: pressures(points), voltage: 300, margin: 1 }, analytic(one));
    const [opens, closes] = [passing(N, points[1], points[2]), passing(N, points[2], points[3])];
    const [[from, to], ...others] = windows(answer, 'breaks-down');
    expect(others).toEqual([]);
    expect(Math.abs(from - opens)).toBeLessThan(0.2 * (closes - opens));
    expect(Math.abs(to - closes)).toBeLessThan(0.2 * (closes - opens));
  });
});

describe('a pump that empties a volume in seconds of three hours', () => {
  it('passes the minimum between two looks at the clock, and is seen to', async () => {
    const start = 101325;
    const time = 1; // volume over speed [s]
    const bay = {
      volume: 1e-3,
      start,
      gas: FLOW_GASES.nitrogen,
      outside: null,
      vents: [],
      pump: { speed: 1e-3 / time, basePressure: 1e-6 },
      gasLoad: 0,
      outgassing: [],
    };
    const history = { duration: T, pressure: { kind: 'bay' as const, bay }, temperature: TEMPERATURE };
    const answer = await follow(paschenCase(one), { history, voltage: 300, margin: 1 }, analytic(one));
    const passed = (branch: 'left' | 'right'): number => time * Math.log(start / pressureOf(densityAt(300, one.typical, branch)));
    const [[from, to], ...others] = windows(answer, 'breaks-down');
    expect(others).toEqual([]);
    const length = passed('left') - passed('right');
    expect(Math.abs(from - passed('right'))).toBeLessThan(0.2 * length);
    expect(Math.abs(to - passed('left'))).toBeLessThan(0.2 * length);
    expect(Math.abs((answer.lowest?.holdOff ?? 0) / minimum(one.typical).voltage - 1)).toBeLessThan(2e-3);
  });
});

describe('a history that ends inside a window', () => {
  it('has a window to its end and no earliest turn-on', async () => {
    const end = [T, 2 * bottom] as const;
    const answer = await follow(paschenCase(one), { history: pressures([start, end]), voltage: 400, margin: 1.5 }, analytic(one));
    const [window] = windows(answer, 'breaks-down');
    expectWindow(window, passing(densityAt(400, one.typical, 'right'), start, end), T, T);
    expect(window[1]).toBe(T);
    expect(answer.earliest).toBeNull();
  });

  it('begun inside one has a window from its start and no latest turn-on', async () => {
    const begin = [0, 2 * bottom] as const;
    const end = [T, 300 * bottom] as const;
    const answer = await follow(paschenCase(one), { history: pressures([begin, end]), voltage: 400, margin: 1.5 }, analytic(one));
    expect(windows(answer, 'breaks-down')[0][0]).toBe(0);
    expect(answer.latest).toBeNull();
    expect(Math.abs((answer.earliest ?? 0) - passing(densityAt(600, one.typical, 'right'), begin, end))).toBeLessThan(5e-3 * T);
    expect(answer.earliest).toBeGreaterThanOrEqual(passing(densityAt(600, one.typical, 'right'), begin, end) - 1);
  });
});

describe('a supply that follows a schedule', () => {
  const history = pressures([start, [T, 3 * bottom]]);

  it('opens and closes windows at its flanks, to the millisecond', async () => {
    // the hold-off voltage at the end is 252 V: 400 V do not hold there, 150 V do
    const voltage = { times: [0, 9000, 9000.001, 9600, 9600.001, T], values: [150, 150, 500, 500, 0, 0] };
    const answer = await follow(paschenCase(one), { history, voltage, margin: 1.2 }, analytic(one));
    const [[from, to], ...others] = windows(answer, 'breaks-down');
    expect(others).toEqual([]);
    const N = densityAt(500, one.typical, 'right');
    const passed = passing(N, start, [T, 3 * bottom]);
    expect(passed).toBeLessThan(9000);
    expect(Math.abs(from - 9000)).toBeLessThan(0.002);
    expect(Math.abs(to - 9600)).toBeLessThan(0.002);
    // off from there on
    expect(Math.abs((answer.earliest ?? 0) - 9600)).toBeLessThan(0.002);
    expect(Math.abs((answer.latest ?? 0) - 9000)).toBeLessThan(0.002);
  });

  it('looks at both sides of every corner', async () => {
    const voltage = { times: [0, 600, 601, 1200, 1201, T], values: [0, 0, 300, 300, 100, 100] };
    const answer = await follow(paschenCase(one), { history, voltage, margin: 1.2 }, analytic(one));
    const times = answer.instants.map(({ time }) => time);
    expect(times).toEqual(expect.arrayContaining([0, 600, 601, 1200, 1201, T]));
    expect(answer.instants.find(({ time }) => time === 601)?.supply).toBe(300);
  });

  it('holds while it is off, and the lowest hold-off voltage is told all the same', async () => {
    const voltage = { times: [0, T], values: [0, 0] };
    const answer = await follow(paschenCase(one), { history, voltage, margin: 1.5 }, analytic(one));
    expect(answer.windows).toEqual([]);
    expect(answer.worst).toBeNull();
    expect(Math.abs((answer.lowest?.holdOff ?? 0) / (closedForm(3 * bottom, SPACING, one.typical) ?? 0) - 1)).toBeLessThan(1e-3);
  });
});

describe('a busy history', () => {
  const rest = pressureOf(4 * bottom);

  it('has every one of sixty pulses, half a second long in three hours', async () => {
    const times: number[] = [];
    const values: number[] = [];
    for (let i = 0; i < 60; i++) {
      times.push(180 * i, 180 * i + 0.01, 180 * i + 0.5, 180 * i + 0.51);
      values.push(100, 400, 400, 100);
    }
    const history = {
      duration: T,
      pressure: { kind: 'table' as const, rows: { times: [0, T], values: [rest, rest] } },
      temperature: TEMPERATURE,
    };
    const world = analytic(one);
    const answer = await follow(paschenCase(one), { history, voltage: { times, values }, margin: 1.5 }, world);
    const broken = windows(answer, 'breaks-down');
    expect(broken).toHaveLength(60);
    for (const [i, [from, to]] of broken.entries()) {
      expect(Math.abs(from - 180 * i)).toBeLessThan(0.02);
      expect(Math.abs(to - (180 * i + 0.5))).toBeLessThan(0.02);
    }
    expect(world.asked.filter(({ kind }) => kind === 'hold-off')).toHaveLength(1);
    expect(answer.notes).toEqual([]);
  });

  it('of a hundred thousand rows shows what only one of them says', async () => {
    const rows = 100_001;
    const times = Float64Array.from({ length: rows }, (_, i) => (i * T) / (rows - 1));
    const values = times.map((t, i) => (i === 54_321 ? rest / 4 : rest * (1 + 0.01 * Math.sin(t))));
    const history = { duration: T, pressure: { kind: 'table' as const, rows: { times, values } }, temperature: TEMPERATURE };
    const answer = await follow(paschenCase(one), { history, voltage: 250, margin: 1 }, analytic(one));
    expect(closedForm(3.95 * bottom, SPACING, one.typical)).toBeGreaterThan(250);
    const [[from, to], ...others] = windows(answer, 'breaks-down');
    expect(others).toEqual([]);
    expect(Math.abs(from - times[54_321])).toBeLessThan(T / (rows - 1));
    expect(Math.abs(to - times[54_321])).toBeLessThan(T / (rows - 1));
  });
});

describe('walls of different yields', () => {
  it('break down by the yield of the one that is the cathode at that time', async () => {
    const settings = paschenCase(one);
    const { right } = settings.electrodes;
    const other = { ...right, ionYield: { ...right.ionYield, low: 0.1, typical: 0.1, high: 0.1 } };
    const asymmetric = { ...settings, electrodes: { left: settings.electrodes.left, right: other } };
    const world = analytic(one);
    const evaluate: Analytic['evaluate'] = async (requests) => {
      const [left, swapped] = [analytic(one), analytic({ low: 0.1, typical: 0.1, high: 0.1 })];
      return Promise.all(requests.map(async (each) => (await (each.polarity > 0 ? left : swapped).evaluate([each]))[0]));
    };
    const N = 3 * bottom;
    const history = pressures([
      [0, N],
      [100, N],
    ]);
    const voltage = { times: [0, 50, 50.01, 100], values: [230, 230, -230, -230] };
    const answer = await follow(asymmetric, { history, voltage, margin: 1 }, { ...world, evaluate });
    expect(closedForm(N, SPACING, 0.01)).toBeGreaterThan(230);
    expect(closedForm(N, SPACING, 0.1)).toBeLessThan(230);
    const [[from, to]] = windows(answer, 'breaks-down');
    expect(Math.abs(from - 50)).toBeLessThan(0.02);
    expect(to).toBe(100);
  });
});

describe('a longer path', () => {
  it('left of the minimum breaks down below what the gap itself holds', async () => {
    const settings = paschenCase(one);
    const longest = 4 * SPACING;
    const withPath = { ...settings, gap: { ...settings.gap, longestPath: longest, longestPathGiven: true } };
    const end = [T, bottom / 12] as const;
    const history = pressures([start, end]);
    const answer = await follow(withPath, { history, voltage: 400, margin: 1.5 }, analytic(one));
    const [window] = windows(answer, 'breaks-down');
    // the longest path is on its own left branch when the gap has long been
    const left = densityAt(400, one.typical, 'left', longest);
    expectWindow(window, passing(densityAt(400, one.typical, 'right'), start, end), passing(left, start, end), T);
    // along the plateau the path that has the minimum has it at any density
    const plateau = answer.instants.filter(
      ({ pressure }) => pressure < 0.9 * pressureOf(bottom) && pressure > 1.1 * pressureOf(bottom / 4),
    );
    expect(plateau.length).toBeGreaterThan(2);
    for (const { holdOff } of plateau) expect(Math.abs((holdOff ?? 0) / minimum(one.typical).voltage - 1)).toBeLessThan(1e-3);
  });
});

describe('yields known only as a spread', () => {
  const end = [T, 1.2 * bottom] as const;
  const history = pressures([start, end]);
  const edge = (voltage: number, ionYield: number): number => passing(densityAt(voltage, ionYield, 'right'), start, end);

  it('make marginal what would not hold at the high end', async () => {
    const answer = await follow(paschenCase(spread), { history, voltage: 400, margin: 1.01 }, analytic(spread));
    const [marginal] = windows(answer, 'marginal');
    expectWindow(marginal, edge(400, spread.high), edge(400, spread.typical), T);
    expect(Math.abs((answer.latest ?? 0) - edge(400, spread.high))).toBeLessThan(5e-3 * T);
  });

  it('shift the window at either end by what the closed form says', async () => {
    const answer = await follow(
      paschenCase(spread),
      { history, voltage: 400, margin: 1.5 },
      analytic(spread, () => 0.95),
    );
    for (const end of ['low', 'high'] as const) {
      const found = answer.ends?.[end];
      if (found === undefined) throw new Error('no ends');
      expectWindow(windows(found, 'breaks-down')[0], edge(400 / 0.95, spread[end]), T, T);
      expect(Math.abs((found.latest ?? 0) - edge(600 / 0.95, spread[end]))).toBeLessThan(5e-3 * T);
      const lowest = 0.95 * (closedForm(Math.max(1.2 * bottom, minimum(spread[end]).column / SPACING), SPACING, spread[end]) ?? 0);
      expect(Math.abs((found.lowest?.holdOff ?? 0) / lowest - 1)).toBeLessThan(2e-3);
    }
  });

  it('are not asked about where one number is given', async () => {
    const world = analytic(one);
    const answer = await follow(paschenCase(one), { history, voltage: 400, margin: 1.5 }, world);
    expect(answer.ends).toBeNull();
    expect(world.asked.every((r) => r.kind === 'lag' || r.yields === 'typical')).toBe(true);
  });
});

describe('gas at rest', () => {
  it('is one simulation, whatever the time and the temperature that make its density', async () => {
    const N = 5 * bottom;
    const temperature = { times: [0, T], values: [250, 350] };
    const pressure = { times: [0, T], values: [(pressureOf(N) * 250) / TEMPERATURE, (pressureOf(N) * 350) / TEMPERATURE] };
    const world = analytic(one);
    const history = { duration: T, pressure: { kind: 'table' as const, rows: pressure }, temperature };
    const answer = await follow(paschenCase(one), { history, voltage: 100, margin: 1.5 }, world);
    expect(world.asked).toHaveLength(1);
    expect(answer.windows).toEqual([]);
    expect(new Set(answer.instants.map(({ holdOff }) => holdOff)).size).toBe(1);
  });
});

describe('simulations that give no answer', () => {
  it('leave their instants outside the model, with the reason, and are counted', async () => {
    const history = pressures([start, [T, 3 * bottom]]);
    const world = analytic(one);
    const evaluate: Analytic['evaluate'] = async (requests) => {
      const answers = await world.evaluate(requests);
      return answers.map((answer, i) =>
        requests[i].density > 50 * bottom && requests[i].density < 60 * bottom
          ? { kind: 'failed', reason: 'made to fail', runs: 1 }
          : answer,
      );
    };
    const answer = await follow(paschenCase(one), { history, voltage: 400, margin: 1.5 }, { ...world, evaluate });
    expect(answer.failures.length).toBeGreaterThan(0);
    expect(answer.notes.join(' ')).toMatch(/Simulations gave no answer at .*taken as not holding: made to fail/);
    const failed = answer.instants.filter(({ note }) => note === 'made to fail');
    expect(failed.length).toBeGreaterThan(0);
    for (const { judgement, holdOff } of failed) {
      expect(judgement).toEqual({ state: 'outside-model', safe: false });
      expect(holdOff).toBeNull();
    }
  });
});

describe('the same history', () => {
  it('asks the same questions again', async () => {
    const history = pressures([start, [T, 0.8 * bottom]]);
    const asked = async (): Promise<readonly unknown[]> => {
      const world = analytic(spread, () => 0.98);
      await follow(paschenCase(spread), { history, voltage: 400, margin: 1.5 }, world);
      return world.asked;
    };
    expect(await asked()).toEqual(await asked());
  });
});
