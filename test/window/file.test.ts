/** A window's file gives back what was written, opens by name in common tools, and is refused when it is not one. */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, rmSync, truncateSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { describe, expect, onTestFinished, test } from 'vitest';
import { windowCsv } from '../../src/commands/window-table.ts';
import { isGapwakeResult, readResultFormat, readRunFile } from '../../src/results/read.ts';
import { readWindowFile } from '../../src/results/window-read.ts';
import { windowNumbers, windowStates } from '../../src/results/window-variables.ts';
import { writeWindowFile } from '../../src/results/window-write.ts';
import type { HistoryEntry, WindowOutcome } from '../../src/search/window/index.ts';

const entry = (i: number): HistoryEntry => ({
  time_s: 10 * i,
  pressure_Pa: 1e5 / (1 + i),
  temperature_K: 290 + i,
  supply_V: i % 2 === 0 ? 400 : -400,
  hold_off_V: i === 3 ? null : 300 + 1 / (i + 3),
  hold_off_at_high_yield_V: i > 4 ? null : 200,
  lag_s: i === 2 ? 1.25e-5 : null,
  state: windowStates[i % windowStates.length],
  note: i === 3 ? 'no-threshold' : null,
});

const ofYield = { windows: [], lowest_hold_off: null, earliest_turn_on_s: 3, latest_turn_on_s: null };
const outcome: WindowOutcome = {
  format: 'gapwake.window/1',
  title: 'Made up, with 12 µA',
  version: '1.2.3',
  case_sha256: 'a'.repeat(64),
  duration_s: 60,
  margin: 1.5,
  ...ofYield,
  worst: null,
  yield_spread: { low: { ion_yield: 0.01, ...ofYield }, high: { ion_yield: 0.1, ...ofYield } },
  history: Array.from({ length: 7 }, (_, i) => entry(i)),
  notes: ['made up'],
  cautions: [{ code: 'edges', text: 'made up', value: null }],
  numerics: { instants: 7, runs: 12, failures: [] },
};
const about = { outcome, study: 'b'.repeat(64), caseText: 'title: Made up\n', coefficientsJson: '[]', tablesJson: '[]' };

async function written(): Promise<string> {
  const at = mkdtempSync(join(tmpdir(), 'gapwake-window-'));
  onTestFinished(() => rmSync(at, { recursive: true, force: true }));
  const path = join(at, 'window.h5');
  await writeWindowFile(path, about);
  return path;
}

const error = (code: string): Error => expect.objectContaining({ name: 'ResultFileError', code }) as unknown as Error;

describe('a window file', () => {
  test('gives back every number, state and text', async () => {
    const file = readWindowFile(await written());
    expect(file).toMatchObject({ title: outcome.title, version: '1.2.3', study: about.study, caseText: about.caseText, outcome });
    expect([...file.time]).toEqual(outcome.history.map(({ time_s }) => time_s));
    expect(file.states).toEqual(outcome.history.map(({ state }) => state));
    for (const { key } of windowNumbers)
      expect([...file.numbers[key]], key).toEqual(outcome.history.map(({ [key]: value }) => value ?? Number.NaN));
  });

  test('is a gapwake result of its kind', async () => {
    const path = await written();
    expect(readResultFormat(path)).toEqual({ kind: 'window', version: 1 });
    expect(isGapwakeResult(path)).toBe(true);
    expect(() => readRunFile(path)).toThrow(error('other-kind'));
  });

  test('that is cut short or missing is refused', async () => {
    const path = await written();
    truncateSync(path, 3000);
    expect(() => readWindowFile(path)).toThrow(error('damaged'));
    expect(() => readWindowFile(`${path}.none`)).toThrow(error('missing'));
  });
});

test('the table has a column for each variable and a row for each instant', () => {
  const [header, ...rows] = windowCsv(outcome).trimEnd().split('\n');
  expect(header).toBe(
    'time [s],pressure [Pa],temperature [K],supply_voltage [V],hold_off_voltage [V],hold_off_voltage_at_high_yield [V],formative_lag [s],state',
  );
  expect(rows).toHaveLength(7);
  expect(rows[2]).toBe(`20,${1e5 / 3},292,400,${300 + 1 / 5},200,0.0000125,breaks-down`);
  expect(rows[3]).toBe('30,25000,293,-400,,200,,outside-model');
});

/** Debian's own Python has the packages; another may come first on the path. */
const python = existsSync('/usr/bin/python3') ? '/usr/bin/python3' : 'python3';
const modules = { netcdf4: 'netCDF4', h5netcdf: 'h5netcdf' } as const;
const SCRIPT = `
import json, sys, xarray
with xarray.open_dataset(sys.argv[2], engine=sys.argv[1]) as data:
    low = data.sel(time=22, method="nearest")
    print(json.dumps({
        "sizes": dict(data.sizes), "coords": sorted(data.coords), "dims": {n: list(v.dims) for n, v in data.variables.items()},
        "units": {n: v.attrs.get("units") for n, v in data.variables.items()},
        "pressure": float(low["pressure"]), "lag": float(low["formative_lag"]),
        "states": data["state"].attrs["flag_meanings"].split(" "), "state": [int(s) for s in data["state"].values],
    }))
`;

describe.each(['netcdf4', 'h5netcdf'] as const)('xarray opens a window file by name (engine %s)', (engine) => {
  const there = spawnSync(python, ['-c', `import xarray, ${modules[engine]}`]).status === 0;
  // in continuous integration the packages are installed, and their absence is a failure
  const skipped = !there && process.env.CI !== 'true';

  test.skipIf(skipped)('dimension, units, values and flags', async () => {
    const { stdout, stderr } = spawnSync(python, ['-c', SCRIPT, engine, await written()], { encoding: 'utf8' });
    expect(stderr).toBe('');
    const opened = JSON.parse(stdout) as Record<string, Record<string, unknown>>;
    expect(opened.sizes).toEqual({ time: 7 });
    expect(opened.coords).toEqual(['time']);
    for (const { name, units } of windowNumbers) {
      expect(opened.dims[name], name).toEqual(['time']);
      expect(opened.units[name], name).toBe(units);
    }
    expect(opened.units.time).toBe('s');
    expect(opened).toMatchObject({ pressure: 1e5 / 3, lag: 1.25e-5, states: [...windowStates] });
    expect(opened.state).toEqual(outcome.history.map(({ state }) => windowStates.indexOf(state)));
  });
});
