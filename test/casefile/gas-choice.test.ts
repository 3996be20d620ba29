/** `gas.data` and `gas.mixture`: what they mean, what is refused, what enters the hash. */
import { describe, expect, it } from 'vitest';
import { hashCase } from '../../src/casefile/index.ts';
import { gasData, gases } from '../../src/gases/index.ts';
import { mixtureOf } from '../../src/gases/mixture.ts';
import { yieldFor } from '../../src/surfaces/index.ts';
import { GOOD, good, OWN_GAS, problem, problems, varied } from './help.ts';

const withGas = (lines: string): string => GOOD.replace('  name: argon\n', lines);
const mixture = (fractions: string): string => withGas(`  mixture: ${fractions}\n`);

describe('gas.data', () => {
  it('takes a named set of a gas instead of the default one, which is listed among the defaults', () => {
    const ward = good(withGas('  name: argon\n  data: ward\n'));
    expect(ward.case.gas.coefficients).toEqual(gasData('argon', 'ward')?.coefficients);
    expect(ward.case.gas.coefficients).not.toEqual(gases.argon.coefficients);
    expect(ward.resolved['gas.data']).toBe('ward');
    expect(ward.defaults.map((d) => d.path)).not.toContain('gas.data');
    const plain = good(GOOD);
    expect(plain.defaults).toContainEqual({ path: 'gas.data', value: 'phelps-petrovic' });
    expect(plain.resolved['gas.data']).toBe('phelps-petrovic');
  });

  it('brings the uncertainty of its set', () => {
    expect(good(withGas('  name: helium\n  data: raizer\n')).case.gas.breakdownUncertainty).toBe(0.5);
  });

  it('changes the hash with the data only: the default set by its name is the same case', () => {
    const { sha256 } = good(GOOD).case;
    expect(good(withGas('  name: argon\n  data: phelps-petrovic\n')).case.sha256).toBe(sha256);
    expect(good(withGas('  name: argon\n  data: ward\n')).case.sha256).not.toBe(sha256);
    const { case: c } = good(GOOD);
    expect(hashCase({ ...c, gas: { ...c.gas, dataSet: 'renamed' } })).toBe(sha256);
  });

  it('stands beside coefficients of the case, which win', () => {
    const { coefficients } = good(withGas('  name: argon\n  data: ward\n  coefficients: { electron_energy: 3 V }\n')).case.gas;
    expect(coefficients.electronEnergy.status).toBe('given');
    expect(coefficients.ionisation).toEqual(gasData('argon', 'ward')?.coefficients.ionisation);
  });

  it.each([
    [
      'a set of another gas',
      '  name: argon\n  data: morrow-lowke\n',
      'unknown-name',
      'a set of data of argon (phelps-petrovic, ward',
      'morrow-lowke',
      null,
    ],
    [
      'a misspelt set',
      '  name: helium\n  data: libermann\n',
      'unknown-name',
      'a set of data of helium (ward, lieberman, raizer)',
      'libermann',
      'lieberman',
    ],
    ['nothing that is a name', '  name: argon\n  data: 5\n', 'wrong-type', 'the name of a set of data', '5', null],
    ['an empty name', '  name: argon\n  data: ""\n', 'unknown-name', 'a set of data of argon', 'nothing', null],
    ['a name of prototypes', '  name: argon\n  data: constructor\n', 'unknown-name', 'a set of data of argon', 'constructor', null],
  ])('refuses %s', (_, lines, code, expected, found, nearest) => {
    const one = problem(withGas(lines));
    expect(one).toMatchObject({ path: 'gas.data', line: 8, code, found, nearest });
    expect(one.expected).toContain(expected);
  });

  it('is refused without the gas that it belongs to', () => {
    expect(problem(OWN_GAS.replace('gas:\n', 'gas:\n  data: ward\n'))).toMatchObject({
      path: 'gas.data',
      code: 'either-or',
      found: 'data without name',
    });
    expect(problem(withGas('  mixture: { argon: 0.5, neon: 0.5 }\n  data: ward\n'))).toMatchObject({
      path: 'gas.data',
      code: 'either-or',
      found: 'data beside mixture',
    });
    // the misspelt gas is the only mistake worth telling
    expect(problems(withGas('  name: argonn\n  data: ward\n')).map((p) => p.path)).toEqual(['gas.name']);
  });

  it('is set and removed by --set, and goes when a mixture comes', () => {
    expect(good(GOOD, ['gas.data=ward']).case.gas.dataSet).toBe('ward');
    expect(problem(GOOD, ['gas.data=wardd'])).toMatchObject({ file: '--set gas.data', nearest: 'ward' });
    const other = good(withGas('  name: argon\n  data: ward\n'), ['gas.mixture={ argon: 0.5, nitrogen: 0.5 }']);
    expect(other.resolved).toMatchObject({ 'gas.mixture.argon': 0.5, 'gas.mixture.nitrogen': 0.5 });
    expect(good(mixture('{ argon: 0.5, nitrogen: 0.5 }'), ['gas.name=neon']).case.gas.name).toBe('neon');
  });
});

describe('gas.mixture', () => {
  it('is built from its gases by the mixing rules', () => {
    const { case: c, resolved, defaults } = good(mixture('{ argon: 90 %, nitrogen: 0.1 }'));
    const made = mixtureOf([
      { gas: gases.argon, fraction: 0.9 },
      { gas: gases.nitrogen, fraction: 0.1 },
    ]);
    expect(c.gas).toMatchObject({
      name: '0.9 argon + 0.1 nitrogen',
      breakdownUncertainty: made.breakdownUncertainty,
      kineticCrossSection: made.kineticCrossSection,
    });
    expect(c.gas.coefficients).toEqual(made.coefficients);
    expect(c.gas.mixture).toEqual([
      { gas: 'argon', fraction: 0.9 },
      { gas: 'nitrogen', fraction: 0.1 },
    ]);
    expect(resolved).toMatchObject({ 'gas.mixture.argon': 0.9, 'gas.mixture.nitrogen': 0.1 });
    expect(Object.keys(resolved).filter((path) => /gas\.(name|data|coefficients)/.test(path))).toEqual([]);
    expect(defaults.map((d) => d.path)).not.toContain('gas.data');
  });

  it('has one hash whatever the order and spelling of its fractions, and another for other fractions', () => {
    const { sha256 } = good(mixture('{ argon: 0.9, nitrogen: 0.1 }')).case;
    expect(good(mixture('{ nitrogen: 10 %, argon: 9e-1 }')).case.sha256).toBe(sha256);
    expect(good(mixture('{ argon: 0.8, nitrogen: 0.2 }')).case.sha256).not.toBe(sha256);
    expect(good(mixture('{ argon: 0.9, oxygen: 0.1 }')).case.sha256).not.toBe(sha256);
  });

  it('of one gas is that gas, and says so', () => {
    const { case: c, notes } = good(mixture('{ argon: 1 }'));
    expect(c.sha256).toBe(good(GOOD).case.sha256);
    expect(c.gas).toEqual(good(GOOD).case.gas);
    expect(notes).toEqual(['gas.mixture: argon alone, read as gas.name: argon']);
  });

  it('gives way to coefficients of the case', () => {
    const { coefficients } = good(withGas('  mixture: { argon: 0.5, nitrogen: 0.5 }\n  coefficients: { electron_energy: 3 V }\n')).case.gas;
    expect(coefficients.electronEnergy.status).toBe('given');
    expect(coefficients.ionisation.form.kind).toBe('mixed');
    const { resolved } = good(withGas('  mixture: { argon: 0.5, nitrogen: 0.5 }\n  coefficients: { electron_energy: 3 V }\n'));
    expect(resolved['gas.coefficients.electron_energy']).toBe(3);
    expect(resolved).not.toHaveProperty('gas.coefficients.ionisation.form');
  });

  it('of a built-in metal has the largest of the yields in its gases, and all of their spread', () => {
    const text = mixture('{ argon: 0.999, helium: 0.001 }').replace('{ ion_yield: 0.02 }', '{ material: nickel }');
    const { ionYield } = good(text).case.electrodes.left;
    const [argon, helium] = ['argon', 'helium'].map((gas) => yieldFor('nickel', gas)?.ionYield);
    expect(ionYield.typical).toBe(helium?.typical);
    expect(ionYield.low).toBe(argon?.low);
    expect(ionYield.high).toBe(helium?.high);
    expect(ionYield.source).toMatch(/^the largest of the yields in argon, helium, that in helium: /);
  });

  it.each([
    [
      'fractions that do not sum to 1',
      '{ argon: 0.9, nitrogen: 0.2 }',
      'gas.mixture',
      'inconsistent',
      'fractions that sum to 1',
      'a sum of 1.1',
      null,
    ],
    [
      'fractions of per cent without the sign',
      '{ argon: 0.9, nitrogen: 10 }',
      'gas.mixture.nitrogen',
      'out-of-range',
      'a fraction above 0 and up to 1',
      '10',
      null,
    ],
    ['a fraction of 0', '{ argon: 1, nitrogen: 0 }', 'gas.mixture.nitrogen', 'out-of-range', 'a fraction above 0', '0', null],
    [
      'a negative fraction',
      '{ argon: 1.5, nitrogen: -0.5 }',
      'gas.mixture.argon',
      'out-of-range',
      'a fraction above 0 and up to 1',
      '1.5',
      null,
    ],
    ['a fraction with a unit', '{ argon: 1 mbar }', 'gas.mixture.argon', 'wrong-dimension', 'a fraction', '1 mbar, a pressure', null],
    ['a fraction that is no number', '{ argon: true }', 'gas.mixture.argon', 'wrong-type', 'a fraction', 'true', null],
    [
      'an unknown gas',
      '{ argon: 0.9, nitrogn: 0.1 }',
      'gas.mixture.nitrogn',
      'unknown-key',
      'a key of gas.mixture (argon',
      'nitrogn',
      'nitrogen',
    ],
    [
      'a name of prototypes',
      '{ argon: 1, constructor: 0.1 }',
      'gas.mixture.constructor',
      'unknown-key',
      'a key of gas.mixture',
      'constructor',
      null,
    ],
    ['no gas', '{}', 'gas.mixture', 'missing-key', 'gases with their fractions', 'none', null],
    ['a list', '[argon, nitrogen]', 'gas.mixture', 'wrong-type', 'a mapping with the keys argon', 'a list', null],
    ['a text', 'argon', 'gas.mixture', 'wrong-type', 'a mapping with the keys argon', 'argon', null],
  ])('refuses %s', (_, fractions, path, code, expected, found, nearest) => {
    const one = problems(mixture(fractions)).find((p) => p.path === path);
    expect(one).toMatchObject({ line: 7, code, found, nearest });
    expect(one?.expected).toContain(expected);
  });

  it('accepts what sums to 1 within 1e-6', () => {
    expect(good(mixture('{ argon: 0.333333, nitrogen: 0.333333, oxygen: 0.333333 }')).case.gas.mixture?.length).toBe(3);
    expect(problem(mixture('{ argon: 0.33333, nitrogen: 0.33333, oxygen: 0.33333 }'))).toMatchObject({ found: 'a sum of 0.99999' });
  });

  it('tells every mistake at once, the sum only where the fractions are right', () => {
    const all = problems(mixture('{ argon: 2, nitrogen: -1, oxygn: 0.1 }'));
    expect(all.map((p) => p.path).toSorted()).toEqual(['gas.mixture.argon', 'gas.mixture.nitrogen', 'gas.mixture.oxygn']);
  });

  it('is refused beside a name, and so is a gas without either', () => {
    expect(problem(withGas('  name: argon\n  mixture: { argon: 0.9, nitrogen: 0.1 }\n'))).toMatchObject({
      path: 'gas.mixture',
      code: 'either-or',
      found: 'name and mixture',
    });
    expect(problem(withGas(''))).toMatchObject({
      path: 'gas',
      code: 'missing-key',
      expected: 'a name or a mixture, coefficients, or both',
    });
  });
});

describe('a scan over fractions', () => {
  const base = (entries: string[], more = ''): string =>
    varied(entries, more).replace('  name: argon\n', '  mixture: { argon: 0.9, nitrogen: 0.1 }\n');
  const argon = '{ path: gas.mixture.argon, from: 0.9, to: 0.5, points: 5 }';
  const nitrogen = '{ path: gas.mixture.nitrogen, from: 10 %, to: 50 %, points: 5 }';

  it('varies all of them together', () => {
    const { at, scan } = good(base([argon, nitrogen], '  zip: true\n'));
    for (let i = 0; i < 5; i++) {
      const point = at(scan?.axes.map(({ values }) => values[i]) ?? []);
      if (!point.ok) throw new Error(JSON.stringify(point.problems));
      expect(point.case.gas.mixture?.[1].fraction).toBeCloseTo(0.1 * (i + 1), 12);
    }
    const direct = good(mixture('{ argon: 0.5, nitrogen: 0.5 }')).case.sha256;
    const last = at([0.5, 0.5]);
    expect(last.ok && last.case.sha256).toBe(direct);
  });

  it('refuses one alone, since the sum could not stay 1, and a grid of several', () => {
    expect(problem(base([argon]))).toMatchObject({ path: 'scan.vary.0.path', code: 'inconsistent', found: 'gas.mixture.argon alone' });
    expect(problem(base([argon])).expected).toContain('sum to 1 at every point');
    expect(problem(base([argon, nitrogen]))).toMatchObject({ path: 'scan.vary.0.path', found: 'fractions in a grid' });
    expect(problem(base([argon], '  zip: true\n'))).toMatchObject({ found: 'gas.mixture.argon alone' });
  });

  it('finds ends that do not sum to 1', () => {
    const wrong = '{ path: gas.mixture.nitrogen, from: 10 %, to: 60 %, points: 5 }';
    const all = problems(base([argon, wrong], '  zip: true\n'));
    expect(all.length).toBeGreaterThan(0);
    for (const one of all) expect(one.found).toContain('found a sum of 1.1');
  });
});
