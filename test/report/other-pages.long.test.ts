import { readdirSync, readFileSync, statSync, truncateSync } from 'node:fs';
import { join } from 'node:path';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { together } from '../../src/report/sections.ts';
import { readScanFile } from '../../src/results/scan-read.ts';
import type { WindowOutcome } from '../../src/search/window/index.ts';
import { plainEnvironment, realProgram } from '../commands/program.ts';
import { GRID, scanCase } from '../scan/studies.ts';
import { browserPath, launch } from './help/browser.ts';
import { seriousFaults } from './help/faults.ts';
import { writeMadeUpWindow } from './help/made-up-window.ts';
import { writeManyPoints } from './help/many-points.ts';
import { cutOff, open } from './help/opened.ts';

const program = realProgram();
const HOSTILE = '</script><img src=x onerror=alert(1)> \u001b[31m';
const at = (name: string): string => join(program.folder(), name);
let outcome: WindowOutcome;

beforeAll(async () => {
  outcome = await writeMadeUpWindow(at('window.h5'), HOSTILE);
  program.write('grid.yaml', scanCase(GRID));
  program.write('line.yaml', scanCase('{ vary: [{ path: supply.voltage.step, from: 190 V, to: 270 V, points: 5 }] }'));
  for (const name of ['grid', 'line']) {
    const { code, err } = await program.run(['scan', `${name}.yaml`, '-o', `${name}.h5`, '--workers', '1', '--quiet']);
    expect({ code, err }).toEqual({ code: 0, err: '' });
  }
  await writeManyPoints(at('many.h5'), 100, 100, HOSTILE);
  for (const name of ['window', 'grid', 'line', 'many']) {
    // without a converter on the path
    const figures = name === 'many' ? [] : ['--figures', `figures-${name}`];
    const { code, out, err } = await program.run(['report', `${name}.h5`, ...figures], { env: { ...plainEnvironment(), PATH: '' } });
    expect({ code, err }).toEqual({ code: 0, err: '' });
    if (name !== 'many') expect(out).toContain('no PNG, because rsvg-convert is not installed');
  }
}, 120_000);

describe('gapwake report on scans and windows', () => {
  test('--figures writes what each kind is read for', () => {
    const svgs = (name: string): string[] => readdirSync(at(`figures-${name}`)).filter((file) => file.endsWith('.svg'));
    expect(svgs('window')).toEqual(
      ['lag-log-time', 'lag', 'pd', 'pressure-log-time', 'pressure', 'voltages-log-time', 'voltages'].map((file) => `${file}.svg`),
    );
    expect(svgs('grid')).toEqual(expect.arrayContaining(['verdict.svg', 'formative-lag.svg', 'peak-current.svg']));
    expect(svgs('line')).toContain('formative-lag.svg');
    for (const name of ['window', 'grid', 'line'])
      for (const file of svgs(name)) {
        const svg = readFileSync(join(at(`figures-${name}`), file), 'utf8');
        expect(/NaN|undefined|Infinity/.test(svg.replace(/base64,[^"]*/g, '')), `${name}/${file}`).toBe(false);
      }
  });

  test('outside the model a window is hatched, elsewhere shaded', () => {
    const svg = readFileSync(join(at('figures-window'), 'voltages.svg'), 'utf8');
    expect(svg).toContain('<pattern id="voltages-hatch"');
    expect(svg).toContain('fill="url(#voltages-hatch)"');
    expect(svg).toMatch(/<rect class="area fill-alarm" x="[\d.]+" y="[\d.]+" width="[\d.]{3,}"/);
    expect(svg).toContain('>latest turn-on<');
  });

  test('truncated files give one line and exit code 4', async () => {
    for (const name of ['grid', 'window']) {
      program.write(`short-${name}.h5`, readFileSync(at(`${name}.h5`)));
      truncateSync(at(`short-${name}.h5`), statSync(at(`${name}.h5`)).size - 400);
      const { code, out, err } = await program.run(['report', `short-${name}.h5`]);
      expect({ code, out, lines: err.trimEnd().split('\n').length }, err).toEqual({ code: 4, out: '', lines: 1 });
    }
  });

  test('ten thousand points stay below 3 MB', () => {
    expect(statSync(at('many.html')).size).toBeLessThan(3e6);
  });
});

// In continuous integration a browser is installed, and its absence is a failure.
const skipped = browserPath() === null && process.env.CI !== 'true';
describe.skipIf(skipped)(`the pages of scans and windows in a browser${skipped ? ' (skipped: chromium is not installed)' : ''}`, () => {
  let browser: Browser;
  beforeAll(async () => {
    browser = await launch();
  }, 60_000);
  afterAll(() => browser?.close());

  test.each(['window', 'grid', 'line', 'many'])('%s opens with no request and no complaint, and fits 420 px', async (name) => {
    const { tab, requests, complaints, close } = await open(browser, at(`${name}.html`), { viewport: { width: 420, height: 800 } });
    expect(await tab.locator('figure svg').count()).toBe({ window: 4, grid: 2, line: 1, many: 2 }[name]);
    expect(await tab.evaluate('document.documentElement.scrollWidth')).toBeLessThanOrEqual(420);
    expect(await cutOff(tab)).toEqual([]);
    expect(await tab.locator('img').count()).toBe(0);
    expect(requests).toEqual([]);
    expect(complaints).toEqual([]);
    await close();
  });

  test.each(['window', 'grid', 'line'])('axe finds no serious fault in %s', async (name) => {
    for (const scheme of ['light', 'dark'] as const) expect(await seriousFaults(browser, at(`${name}.html`), scheme)).toEqual([]);
  });

  test('hostile texts of a window are shown as text', async () => {
    const { tab, close } = await open(browser, at('window.html'));
    expect(await tab.locator('h1').textContent()).toBe('</script><img src=x onerror=alert(1)> \\u001b[31m');
    expect(await tab.locator('.cautions').textContent()).toContain('onerror=alert(1)> \\u001b[31m');
    await close();
  });

  test('pointer and keys move one moment through the figures of a window, and its numbers are those of the outcome', async () => {
    const { tab, close } = await open(browser, at('window.html'));
    const index = async (): Promise<number> => Number(await tab.locator('body').getAttribute('data-index'));
    const figure = tab.locator('.timed svg').first();
    await figure.scrollIntoViewIfNeeded();
    const box = await figure.boundingBox();
    if (box === null) throw new Error('no figure');
    await tab.mouse.move(box.x + box.width * 0.2, box.y + box.height / 2);
    await tab.waitForTimeout(80);
    const before = await index();
    expect(before).toBeLessThan(30);
    const ring = async (): Promise<string | null> => tab.locator('#now circle.now').getAttribute('cx');
    const ringBefore = Number(await ring());
    await tab.keyboard.press('ArrowRight');
    await expect.poll(index).toBe(before + 1);
    // the pressure falls: the ring on the path goes to the left
    expect(Number(await ring())).toBeLessThan(ringBefore);
    const { hold_off_V } = outcome.history[before + 1];
    expect(Number((await tab.locator('[data-reading=holdOff]').textContent())?.split(' ')[0])).toBeCloseTo(
      Number(((hold_off_V ?? 0) / ((hold_off_V ?? 0) < 1000 ? 1 : 1000)).toPrecision(3)),
      6,
    );
    const valueAt = (path: string): unknown =>
      path.split('.').reduce<unknown>((value, key) => (value as Record<string, unknown>)[key], outcome);
    const shown = (await tab.evaluate(
      `[...document.querySelectorAll('[data-path]')].map((node) => [node.dataset.path, node.dataset.value])`,
    )) as [string, string][];
    expect(shown.length).toBeGreaterThan(15);
    for (const [path, value] of shown) expect(JSON.parse(value), path).toBe(valueAt(path));
    const all = (await tab.evaluate(
      `[...document.querySelectorAll('[data-outcome]')].map((node) => [node.dataset.outcome, node.textContent])`,
    )) as [string, string][];
    expect(all.length).toBeGreaterThan(400);
    for (const [path, value] of all) expect(JSON.parse(value), path).toBe(valueAt(path));
    await close();
  });

  test('a click and the arrow keys choose a point of a scan, and what is shown of it is what its file says', async () => {
    const file = readScanFile(at('grid.h5'));
    const points = [...file.points()];
    const { tab, close } = await open(browser, at('grid.html'));
    const chosen = async (): Promise<number> => Number(await tab.locator('body').getAttribute('data-point'));
    const check = async (place: number): Promise<void> => {
      const shown = (await tab.evaluate(
        `[...document.querySelectorAll('#point [data-headline]')].map((node) => [node.dataset.headline, node.dataset.value])`,
      )) as [string, string][];
      expect(shown.length).toBeGreaterThan(10);
      for (const [name, value] of shown) {
        const headline = file.headlines.find((each) => each.name === name);
        const expected = headline?.of(points[place]);
        if (headline?.kind === 'number' || headline?.kind === 'count') expect(Number(value), name).toBe(expected);
        else expect(value, name).toBe(Array.isArray(expected) ? expected.join(', ') || 'none' : expected);
      }
      expect(await tab.locator('#point').textContent()).toContain(together(points[place].outcome?.verdict.reason ?? '?'));
    };
    const start = await chosen();
    await check(start);
    // 3 pressures across, 4 voltages upwards; the voltages run fastest
    await tab.keyboard.press('ArrowUp');
    await expect.poll(chosen).toBe(start + 1);
    await tab.keyboard.press('ArrowRight');
    await expect.poll(chosen).toBe(start + 1 + 4);
    await check(start + 5);

    const figure = tab.locator('.points svg').first();
    await figure.scrollIntoViewIfNeeded();
    const box = await figure.boundingBox();
    if (box === null) throw new Error('no figure');
    await tab.mouse.click(box.x + 110, box.y + box.height - 70); // lower left: the first of both
    await expect.poll(chosen).toBe(0);
    await check(0);

    // curves instead of maps
    await tab.getByLabel('Upwards').selectOption('');
    await expect.poll(() => tab.locator('figure svg').count()).toBe(1);
    expect(await tab.locator('[data-point]:not(body)').count()).toBe(3);
    await close();
  });
});
