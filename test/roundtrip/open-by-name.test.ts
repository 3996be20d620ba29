import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { headlinesOf } from '../../src/results/scan-variables.ts';
import { fieldVariables, scalarVariables } from '../../src/results/variables.ts';
import { openRunFile } from '../../src/results/write.ts';
import { folder } from './folder.ts';
import { about, axis, point, writePoints } from './points.ts';
import { cellCentres, documents, snapshot } from './snapshots.ts';

/** Debian's own Python has the packages; another may come first on the path. */
const python = existsSync('/usr/bin/python3') ? '/usr/bin/python3' : 'python3';
const script = fileURLToPath(new URL('open_by_name.py', import.meta.url));
const modules = { netcdf4: 'netCDF4', h5netcdf: 'h5netcdf' } as const;

interface Opened {
  readonly sizes: Readonly<Record<string, number>>;
  readonly coords: readonly string[];
  readonly attrs: Readonly<Record<string, string>>;
  readonly variables: Readonly<
    Record<
      string,
      {
        dims: string[];
        kind: string;
        units: string | null;
        long_name: string;
        flags: number[][];
        flag_meanings: string | null;
        value: unknown;
      }
    >
  >;
  readonly nearest: number;
}

function run(...args: string[]): { status: number | null; stdout: string; stderr: string } {
  return spawnSync(python, args, { encoding: 'utf8', maxBuffer: 2 ** 26 });
}

describe.each(['netcdf4', 'h5netcdf'] as const)('xarray opens a run file by name (engine %s)', (engine) => {
  const there = run('-c', `import xarray, ${modules[engine]}`).status === 0;
  // In continuous integration the packages are installed, and their absence is a failure.
  const skipped = !there && process.env.CI !== 'true';
  const name = skipped ? ` (skipped: python3-xarray with ${modules[engine]} is not installed)` : '';

  test.skipIf(skipped)(`dimensions, coordinates, units and values${name}`, async () => {
    const path = join(folder(), 'run.h5');
    const writer = await openRunFile(path, { x: cellCentres(30), negativeIons: true });
    const snapshots = Array.from({ length: 70 }, (_, index) => snapshot(index, 30, true));
    for (const each of snapshots) writer.append(each);
    writer.finish(documents);

    const { status, stdout, stderr } = run(script, engine, path);
    expect(stderr).toBe('');
    expect(status).toBe(0);
    const opened = JSON.parse(stdout) as Opened;

    expect(opened.sizes).toEqual({ time: 70, x: 30 });
    expect(opened.coords).toEqual(['time', 'x']);
    expect(opened.attrs).toEqual({ format: 'gapwake.run/1', title: documents.title, program: 'gapwake', version: documents.version });

    const { variables } = opened;
    const ofKind = (kind: string): Record<string, unknown> =>
      Object.fromEntries(
        Object.entries(variables)
          .filter(([, variable]) => variable.kind === kind)
          .map(([each, { dims, units }]) => [each, [...dims, units]]),
      );
    expect(ofKind('float64')).toEqual({
      time: ['time', 's'],
      x: ['x', 'm'],
      supply_voltage: ['time', 'V'],
      open_gap_voltage: ['time', 'V'],
      gap_voltage: ['time', 'V'],
      conduction_current: ['time', 'A'],
      total_current: ['time', 'A'],
      supply_current: ['time', 'A'],
      gap_energy: ['time', 'J'],
      source_energy: ['time', 'J'],
    });
    expect(ofKind('float32')).toEqual({
      electron_density: ['time', 'x', 'm-3'],
      ion_density: ['time', 'x', 'm-3'],
      negative_ion_density: ['time', 'x', 'm-3'],
      electric_field: ['time', 'x', 'V m-1'],
      potential: ['time', 'x', 'V'],
      electron_flux: ['time', 'x', 'm-2 s-1'],
      ion_flux: ['time', 'x', 'm-2 s-1'],
      negative_ion_flux: ['time', 'x', 'm-2 s-1'],
      ionisation_rate: ['time', 'x', 'm-3 s-1'],
    });
    expect(ofKind('text')).toEqual({ case_text: [null], outcome_json: [null], coefficients_json: [null], tables_json: [null] });
    for (const [each, { long_name }] of Object.entries(variables)) expect(long_name, each).toMatch(/^\w.{4,}/);

    expect(variables.time?.value).toEqual(snapshots.map(({ time }) => time));
    expect(variables.x?.value).toEqual([...cellCentres(30)]);
    for (const { key, name: each } of scalarVariables)
      expect(variables[each]?.value, each).toEqual(snapshots.map(({ [key]: value }) => value));
    for (const { key, name: each } of fieldVariables) {
      const expected = snapshots.map(({ [key]: values }) => [...Float32Array.from(values as Float64Array)]);
      expect(variables[each]?.value, each).toEqual(expected);
    }
    expect(variables.case_text?.value).toBe(documents.caseText);
    expect(variables.outcome_json?.value).toBe(documents.outcomeJson);
    expect(variables.tables_json?.value).toBe(documents.tablesJson);

    // x = 3 mm lies between cells 14 and 15 of 30 over 6 mm; either is nearest.
    const density = (snapshots[2] as (typeof snapshots)[0]).electronDensity;
    expect([density[14], density[15]].map((value) => Math.fround(value as number))).toContain(opened.nearest);
  });

  test.skipIf(skipped)(`a scan has its axes as dimensions and its headlines on their grid${name}`, async () => {
    const path = join(folder(), 'scan.h5');
    const axes = [axis('gas.pressure', 'Pa', [100, 200, 300, 400]), axis('supply.voltage.step', 'V', [1, 2, 3])];
    const what = about(axes, { find: 'hold-off' });
    const points = Array.from({ length: 12 }, (_, index) => point(index, 'hold-off'));
    await writePoints(path, what, points);
    const { status, stdout, stderr } = run(script, engine, path);
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    const opened = JSON.parse(stdout) as Opened;
    expect(opened.sizes).toEqual({ gas_pressure: 4, supply_voltage_step: 3 });
    expect(opened.coords).toEqual(['gas_pressure', 'supply_voltage_step']);
    expect(opened.attrs).toEqual({ format: 'gapwake.scan/1', title: 'Made up', program: 'gapwake', version: '1.2.3' });
    expect(opened.variables.gas_pressure).toMatchObject({ units: 'Pa', long_name: 'gas.pressure', value: [100, 200, 300, 400] });
    for (const headline of headlinesOf('hold-off')) {
      const variable = opened.variables[headline.name] as Opened['variables'][string];
      expect(variable, headline.name).toMatchObject({
        dims: ['gas_pressure', 'supply_voltage_step'],
        units: 'units' in headline ? headline.units : '1',
        long_name: headline.longName,
        flag_meanings: 'meanings' in headline ? headline.meanings.join(' ') : null,
      });
      if (headline.kind === 'number') {
        expect((variable.value as (number | null)[][]).flat(), headline.name).toEqual(points.map((each) => headline.of(each)));
      }
      if (headline.kind === 'flag') {
        // decoded as the CF conventions say: the meaning at the place of the value
        const [values = []] = variable.flags;
        const words = (variable.value as number[][]).flat().map((value) => headline.meanings[values.indexOf(value)]);
        expect(words, headline.name).toEqual(points.map((each) => headline.of(each)));
      }
      if (headline.kind === 'mask') {
        const [masks = []] = variable.flags;
        const words = (variable.value as number[][])
          .flat()
          .map((value) => headline.meanings.filter((_, i) => value & (masks[i] as number)));
        expect(words.map((each) => each.toSorted())).toEqual(points.map((each) => headline.of(each).toSorted()));
      }
    }
    // 210 Pa is nearest to the second pressure, 2 V is the second voltage: point 4
    expect(opened.nearest).toBe(200.5);
  });

  test.skipIf(skipped)(`points in a list have the axes as coordinates${name}`, async () => {
    const path = join(folder(), 'list.h5');
    const values = [Float64Array.from([5, 6, 5])];
    const layout = { kind: 'list', indices: Int32Array.from([2, 3, 9]), values } as const;
    await writePoints(
      path,
      about([axis('gap.area', 'm^2', [5, 6])], { layout, total: 10 }),
      [2, 3, 9].map((index) => point(index)),
    );
    const { status, stdout, stderr } = run(script, engine, path);
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    const opened = JSON.parse(stdout) as Opened;
    expect(opened.sizes).toEqual({ point: 3 });
    expect(opened.coords).toEqual(['gap_area', 'point']);
    expect(opened.variables.point?.value).toEqual([2, 3, 9]);
    expect(opened.variables.gap_area).toMatchObject({ dims: ['point'], units: 'm^2', value: [5, 6, 5] });
  });
});
