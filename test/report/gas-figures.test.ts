import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect, test } from 'vitest';
import { gases } from '../../src/gases/index.ts';
import { realProgram } from '../commands/program.ts';

const program = realProgram();

test('gapwake gas --figures draws every coefficient of a gas with its source, its range and other sets', async () => {
  const { code, out, err } = await program.run(['gas', 'argon', '--figures', 'argon']);
  expect({ code, err }).toEqual({ code: 0, err: '' });
  expect(out).toMatch(/^Written: argon \(5 SVG/);
  const folder = join(program.folder(), 'argon');
  expect(readdirSync(folder).filter((name) => name.endsWith('.svg'))).toEqual(
    ['electron-energy', 'electron-mobility', 'ion-energy', 'ion-mobility', 'ionisation'].map((name) => `${name}.svg`),
  );
  const svg = readFileSync(join(folder, 'ionisation.svg'), 'utf8');
  const { source, range } = gases.argon.coefficients.ionisation;
  expect(svg).toContain(source.split(',')[0]);
  expect(range).not.toBeNull();
  expect(svg).toContain('class="area band"');
  for (const set of Object.keys(gases.argon.alternatives))
    if (gases.argon.alternatives[set].coefficients.ionisation) expect(svg).toContain(`>${set}<`);
  expect(/NaN|undefined|Infinity/.test(svg)).toBe(false);

  const refused = await program.run(['gas', '--figures', 'x']);
  expect(refused.code).toBe(2);
  expect(refused.err).toContain('--figures needs the name of a gas');
});

test('every built-in gas can be drawn', async () => {
  const { gasFigures } = await import('../../src/report/gas/figures.ts');
  const { namedCoefficients } = await import('../../src/commands/coefficients.ts');
  for (const { title, coefficients } of Object.values(gases)) {
    const curves = namedCoefficients(coefficients).map(({ coefficient, ...named }) => ({ ...named, ...coefficient, others: [] }));
    for (const { name, svg } of gasFigures(title, curves)) {
      expect(/NaN|undefined|Infinity/.test(svg), `${title}, ${name}`).toBe(false);
      expect(svg, `${title}, ${name}`).toMatch(/class="curve s1" d="M[\d.]+ [\d.]+L/);
    }
  }
});
