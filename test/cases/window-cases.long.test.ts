/** Cases with a history, followed for real but for what makes it long: one yield in place of a spread, and few cells.
 *  The times are those that the opening comments tell; 3 %, because this guards the stories, and edges are tested elsewhere. */
import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { readCase } from '../../src/casefile/index.ts';
import { tableReader } from '../../src/commands/tables.ts';
import { answerOf, followWindow, type WindowOutcome, windowOutcome } from '../../src/search/window/index.ts';
import { simulateNow } from '../../src/simulate.ts';

const folder = fileURLToPath(new URL('../../cases', import.meta.url));
const MINUTE = 60;
const DAY = 86400;

const reduced: Readonly<Record<string, readonly string[]>> = {
  'balloon-bay-ascent': ['electrodes.left.ion_yield=0.01'],
  'chamber-pump-down': ['electrodes.left.ion_yield=0.03'],
  'leak-into-tube': [],
  // a few cells do not resolve attachment in dense gas
  'outgassing-after-launch': ['history.pressure.bay.start=30 mbar'],
};

const story: Readonly<Record<string, (o: WindowOutcome) => void>> = {
  'balloon-bay-ascent': (o) => {
    const [marginal, broken] = o.windows;
    near(marginal.from_s, 95.8 * MINUTE);
    near(broken.from_s, 110 * MINUTE);
    expect(broken).toMatchObject({ state: 'breaks-down', to_s: 10800 });
    near(o.latest_turn_on_s, marginal.from_s);
    near(o.lowest_hold_off?.voltage_V, 386);
    near(o.worst?.lag_s, 61.4e-6, 0.05);
  },
  'chamber-pump-down': (o) => {
    expect(o.windows.map(({ state }) => state)).toEqual(['marginal', 'breaks-down', 'outside-model']);
    near(o.windows[1].from_s, 6.5 * MINUTE);
    near(o.windows[1].to_s, 12.4 * MINUTE);
    expect(o.earliest_turn_on_s).toBeNull();
    expect(o.cautions.map(({ code }) => code)).toContain('insulator');
  },
  'leak-into-tube': (o) => {
    expect(o.windows.map(({ state, below_paschen_minimum }) => [state, below_paschen_minimum])).toEqual([
      ['outside-model', false],
      ['breaks-down', false],
    ]);
    near(o.windows[1].from_s, 2.4 * DAY);
    near(o.lowest_hold_off?.voltage_V, 261);
  },
  'outgassing-after-launch': (o) => {
    const broken = o.windows.filter(({ state }) => state === 'breaks-down');
    expect(broken).toHaveLength(1);
    near(broken[0].from_s, 10 * MINUTE, 0.01);
    near(broken[0].to_s, 22.6 * MINUTE);
    near(o.latest_turn_on_s, 10 * MINUTE, 0.01);
  },
};

function near(value: number | null | undefined, expected: number, share = 0.03): void {
  expect(Math.abs((value ?? Number.NaN) / expected - 1)).toBeLessThan(share);
}

async function outcomeOf(name: string, overrides: readonly string[]): Promise<WindowOutcome> {
  const text = readFileSync(`${folder}/${name}.yaml`, 'utf8');
  const read = readCase(text, `${name}.yaml`, tableReader(folder), [...overrides, 'numerics.cells=60']);
  if (!read.ok || read.window === null) throw new Error(`${name}: ${JSON.stringify(read)}`);
  const { case: settings, window } = read;
  const answer = await followWindow(settings, window, {
    evaluate: async (requests) => requests.map((request) => answerOf(settings, request, simulateNow)),
  });
  return windowOutcome(settings, window, answer, [], 'test');
}

describe.each(Object.keys(reduced))('the history of cases/%s.yaml', (name) => {
  it('leads to the windows that its comment tells of', async () => {
    const outcome = await outcomeOf(name, reduced[name]);
    story[name](outcome);
    expect(outcome.numerics.failures).toEqual([]);
  }, 240_000);
});

describe('cases with a history', () => {
  it('are those followed here', () => {
    const names = readdirSync(folder).filter((file) => file.endsWith('.yaml'));
    const withHistory = names.filter((file) => /^history:/m.test(readFileSync(`${folder}/${file}`, 'utf8')));
    expect(withHistory.sort()).toEqual(
      Object.keys(reduced)
        .map((name) => `${name}.yaml`)
        .sort(),
    );
  });

  it('hold below the Paschen minimum even in high vacuum', async () => {
    const outcome = await outcomeOf('chamber-pump-down', [...reduced['chamber-pump-down'], 'history.voltage=100 V']);
    expect(outcome.windows.map(({ state, below_paschen_minimum }) => [state, below_paschen_minimum])).toEqual([['outside-model', true]]);
    expect(outcome.earliest_turn_on_s).toBe(0);
  }, 240_000);
});
