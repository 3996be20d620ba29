import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { createHdf5 } from '../../src/results/hdf5.ts';
import { readRunFile } from '../../src/results/read.ts';
import { openRunFile } from '../../src/results/write.ts';
import { openCase, realProgram } from '../commands/program.ts';
import { cellCentres, documents, snapshot } from '../roundtrip/snapshots.ts';
import { browserPath, launch } from './help/browser.ts';
import { seriousFaults } from './help/faults.ts';
import { writeLongRun } from './help/long-run.ts';
import { cutOff, open } from './help/opened.ts';

const program = realProgram();
const HOSTILE = '</script><script>alert(1)</script><img src=x onerror=alert(2)> \\e[31mred\\e[0m \\u202e';

beforeAll(async () => {
  program.write('plain.yaml', openCase());
  expect((await program.run(['run', 'plain.yaml', '-o', 'plain.h5', '--quiet'])).code).toBe(0);
}, 60_000);

describe('gapwake report on a run', () => {
  test('the page lies beside the result, replaces an older page and nothing else', async () => {
    const first = await program.run(['report', 'plain.h5']);
    expect(first).toMatchObject({ code: 0, err: '' });
    expect(first.out).toMatch(/^Written: plain\.html \(\d+ kB\)\.\n$/);
    expect((await program.run(['report', 'plain.h5', '--quiet'])).out).toBe('');

    const other = program.write('notes.html', '<p>mine</p>');
    const refused = await program.run(['report', 'plain.h5', '-o', 'notes.html']);
    expect(refused.code).toBe(4);
    expect(refused.err).toBe('gapwake: notes.html: exists and is not a page of gapwake; it is not replaced\n');
    expect(readFileSync(other, 'utf8')).toBe('<p>mine</p>');
    expect(readdirSync(program.folder()).filter((name) => name.endsWith('.part'))).toEqual([]);
  });

  test('a truncated file, a foreign one, a missing one, one of a newer version and one whose outcome is not understood give one line and exit code 4', async () => {
    const whole = readFileSync(join(program.folder(), 'plain.h5'));
    program.write('short.h5', whole.subarray(0, whole.length / 2));
    program.write('foreign.h5', 'x,y\n1,2\n');
    // a sound file, with an outcome that is none
    const writer = await openRunFile(join(program.folder(), 'odd.h5'), { x: cellCentres(4), negativeIons: false });
    writer.append(snapshot(0, 4, false));
    writer.finish(documents);
    const newer = await createHdf5(join(program.folder(), 'newer.h5'));
    newer.attribute('format', 'gapwake.run/2');
    newer.attribute('version', '9.0.0');
    newer.close();
    const files = ['short.h5', 'foreign.h5', 'missing.h5', 'newer.h5', 'odd.h5'];
    for (const file of files) {
      const { code, out, err } = await program.run(['report', file, '-o', 'never.html']);
      expect(code, file).toBe(4);
      expect(out, file).toBe('');
      expect(err.trimEnd().split('\n'), file).toHaveLength(1);
      expect(err, file).toContain(file);
    }
    expect(existsSync(join(program.folder(), 'never.html'))).toBe(false);
  });

  test('--figures writes every figure as SVG with text of at least 11 px, and as PNG where a converter is installed', async () => {
    const { code, out } = await program.run(['report', 'plain.h5', '-o', 'f.html', '--figures', 'figures']);
    expect(code).toBe(0);
    const files = readdirSync(join(program.folder(), 'figures'));
    const svgs = files.filter((name) => name.endsWith('.svg'));
    for (const name of ['voltages', 'currents', 'field-map', 'electron-map', 'ion-map', 'ionisation-map', 'energies', 'path'])
      expect(svgs, name).toContain(`${name}.svg`);
    expect(svgs).toContain('voltages-log-time.svg');
    expect(svgs).toContain('density-profile-collapse.svg');
    for (const name of svgs) {
      const svg = readFileSync(join(program.folder(), 'figures', name), 'utf8');
      expect(svg, name).toMatch(/^<\?xml version="1.0" encoding="UTF-8"\?>\n<svg xmlns="http:\/\/www.w3.org\/2000\/svg"/);
      expect(svg, name).toContain("font-family:'DejaVu Sans'");
      const sizes = [...svg.matchAll(/font-size:(\d+)px/g)].map(([, size]) => Number(size));
      expect(sizes.length, name).toBeGreaterThan(0);
      expect(Math.min(...sizes), name).toBeGreaterThanOrEqual(11);
      expect(/NaN|undefined|Infinity/.test(svg.replace(/base64,[^"]*/g, '')), name).toBe(false);
    }
    const pngs = files.filter((name) => name.endsWith('.png'));
    expect(out).toMatch(pngs.length === svgs.length ? /SVG and \d+ PNG/ : /no PNG, because rsvg-convert is not installed/);
  });

  test('a page of a usual run stays below 3 MB', () => {
    expect(statSync(join(program.folder(), 'plain.html')).size).toBeLessThan(3e6);
  });
});

// In continuous integration a browser is installed, and its absence is a failure.
const skipped = browserPath() === null && process.env.CI !== 'true';
describe.skipIf(skipped)(`the page of a run in a browser${skipped ? ' (skipped: chromium is not installed)' : ''}`, () => {
  let browser: Browser;
  let page = '';
  beforeAll(async () => {
    browser = await launch();
    page = join(program.folder(), 'page.html');
    expect((await program.run(['report', 'plain.h5', '-o', 'page.html', '--quiet'])).code).toBe(0);
  }, 60_000);
  afterAll(() => browser?.close());

  test('it opens from disk with no request and no complaint', async () => {
    const { tab, requests, complaints, close } = await open(browser, page);
    expect(await tab.locator('figure svg').count()).toBe(11);
    expect(requests).toEqual([]);
    expect(complaints).toEqual([]);
    await close();
  });

  test('a script that got into the page would not run, and could load nothing', async () => {
    const { tab, complaints, close } = await open(browser, page);
    await tab.evaluate(`{
      const script = document.createElement('script');
      script.textContent = 'window.got = true';
      document.body.append(script);
      const image = new Image();
      image.src = 'https://gapwake.invalid/x.png';
      document.body.append(image);
      fetch('https://gapwake.invalid/x.json').catch(() => undefined);
      document.body.append(Object.assign(document.createElement('iframe'), { src: 'https://gapwake.invalid/' }));
    }`);
    await expect.poll(() => complaints.length).toBeGreaterThanOrEqual(4);
    expect(await tab.evaluate('window.got')).toBeUndefined();
    expect(complaints.every((line) => line.includes('Content Security Policy'))).toBe(true);
    await close();
  });

  test('pointer and keys move one moment through all figures', async () => {
    const run = readRunFile(join(program.folder(), 'plain.h5'));
    const { tab, close } = await open(browser, page);
    const index = async (): Promise<number> => Number(await tab.locator('body').getAttribute('data-index'));
    /** where the line of the moment stands in each figure over time, as a share of its plot */
    const places = (): Promise<number[]> =>
      tab.evaluate(`[...document.querySelectorAll('.timed svg')].map((svg) => {
        const edge = svg.querySelector('.axis .edge');
        return (Number(svg.querySelector('line.now').getAttribute('x1')) - Number(edge.getAttribute('x'))) / Number(edge.getAttribute('width'));
      })`) as Promise<number[]>;

    const figure = tab.locator('.timed svg').first();
    await figure.scrollIntoViewIfNeeded();
    const box = await figure.boundingBox();
    if (box === null) throw new Error('no figure');
    await tab.mouse.move(box.x + box.width * 0.3, box.y + box.height / 2);
    await tab.waitForTimeout(100);
    const early = await index();
    const before = await places();
    await tab.mouse.move(box.x + box.width * 0.6, box.y + box.height / 2);
    await expect.poll(index).toBeGreaterThan(early);
    const after = await places();
    expect(new Set(after.map((share) => share.toFixed(6))).size).toBe(1);
    expect(after[0]).toBeGreaterThan(before[0]);

    const there = await index();
    await tab.keyboard.press('ArrowRight');
    await expect.poll(index).toBe(there + 1);
    await tab.keyboard.press('ArrowLeft');
    await tab.keyboard.press('ArrowLeft');
    await expect.poll(index).toBe(there - 1);

    await tab.getByRole('button', { name: 'collapse' }).click();
    const collapse = (run.outcome.onset as { collapse_time_s: number }).collapse_time_s;
    await expect.poll(async () => Math.abs(Number(await tab.locator('body').getAttribute('data-time')) / collapse - 1)).toBeLessThan(0.05);
    const voltage = run.scalars.gapVoltage[await index()];
    expect(await tab.locator('[data-reading=gapVoltage]').textContent()).toBe(`${Number(voltage.toPrecision(3))} V`);

    // a held moment stays, whatever the pointer does
    const held = await index();
    await tab.locator('#hold').click();
    await tab.mouse.move(box.x + box.width * 0.2, box.y + box.height / 2);
    await tab.waitForTimeout(60);
    expect(await index()).toBe(held);

    // another time axis shows the same moment
    await tab.getByLabel('log from threshold').check();
    expect(await index()).toBe(held);
    expect((await places())[0]).not.toBeCloseTo(after[0], 3);
    // the slider has the keys of sliders
    await tab.locator('#moment').focus();
    await tab.keyboard.press('Home');
    await expect.poll(index).toBe(0);
    await close();
  });

  test('its numbers are those of the outcome', async () => {
    const { outcome } = readRunFile(join(program.folder(), 'plain.h5'));
    const at = (path: string): unknown => path.split('.').reduce<unknown>((value, key) => (value as Record<string, unknown>)[key], outcome);
    const { tab, close } = await open(browser, page);
    const shown = (await tab.evaluate(`[...document.querySelectorAll('[data-path]')].map((node) =>
      [node.dataset.path, node.dataset.value, node.textContent])`)) as [string, string, string][];
    expect(shown.length).toBeGreaterThan(15);
    const prefixes: Record<string, number> = { f: -15, p: -12, n: -9, µ: -6, m: -3, k: 3, M: 6 };
    for (const [path, value, text] of shown) {
      expect(JSON.parse(value), path).toBe(at(path));
      const [, number, unit] = /^[+]?(\S+)(?: (.*))?$/.exec(text) ?? [];
      if (text === '–') continue;
      const prefix = prefixes[/^([fpnµmkM])[VAJs]/.exec(unit ?? '')?.[1] ?? ''] ?? 0;
      const scale =
        unit === '%' ? 0.01 : unit?.endsWith('V/cm') ? 100 : /^([µmc]?)m$/.exec(unit ?? '')?.[1] ? 10 ** (unit === 'mm' ? -3 : -6) : 1;
      const read = Number(number) * scale * (/^[µm]m$/.test(unit ?? '') ? 1 : 10 ** prefix);
      expect(read / (at(path) as number), `${path}: ${text}`).toBeCloseTo(1, 2);
    }
    const all = (await tab.evaluate(`[...document.querySelectorAll('[data-outcome]')].map((node) =>
      [node.dataset.outcome, node.textContent])`)) as [string, string][];
    expect(all.length).toBeGreaterThan(40);
    for (const [path, value] of all) expect(JSON.parse(value), path).toBe(at(path));
    await close();
  });

  test('axe finds no serious fault, light or dark', async () => {
    for (const scheme of ['light', 'dark'] as const) expect(await seriousFaults(browser, page, scheme)).toEqual([]);
  });

  test('at 420 px nothing is wider than the window, and no text of a figure is cut off', async () => {
    const { tab, close } = await open(browser, page, { viewport: { width: 420, height: 800 } });
    expect(await tab.evaluate('document.documentElement.scrollWidth')).toBeLessThanOrEqual(420);
    expect(await cutOff(tab)).toEqual([]);
    await close();
  });

  test('a title with markup, a script and terminal codes is shown as text', async () => {
    program.write('hostile.yaml', openCase({ title: `"${HOSTILE}"`, until: '20 us' }));
    expect((await program.run(['run', 'hostile.yaml', '-o', 'hostile.h5', '--quiet'])).code).toBe(0);
    expect((await program.run(['report', 'hostile.h5', '--quiet'])).code).toBe(0);
    const path = join(program.folder(), 'hostile.html');
    const text = readFileSync(path, 'utf8');
    // biome-ignore lint/suspicious/noControlCharactersInRegex: none may be left
    expect(text).not.toMatch(/[\u001b\u202e]/);
    const { tab, requests, complaints, close } = await open(browser, path);
    expect(await tab.locator('h1').textContent()).toBe(
      '</script><script>alert(1)</script><img src=x onerror=alert(2)> \\u001b[31mred\\u001b[0m \\u202e',
    );
    expect(await tab.locator('img').count()).toBe(0);
    expect(await tab.locator('script').count()).toBe(2);
    expect(requests).toEqual([]);
    expect(complaints).toEqual([]);
    await close();
  });

  test('a run of 2,000 snapshots opens, and its page stays below 3 MB', async () => {
    await writeLongRun(join(program.folder(), 'plain.h5'), join(program.folder(), 'long.h5'), 2000, 50);
    expect((await program.run(['report', 'long.h5', '--quiet'])).code).toBe(0);
    const path = join(program.folder(), 'long.html');
    expect(statSync(path).size).toBeLessThan(3e6);
    const { tab, complaints, close } = await open(browser, path);
    expect(complaints).toEqual([]);
    expect(await tab.locator('#moment').getAttribute('max')).toBe('1999');
    await close();
  });
});

test('nothing of the page names a network address', () => {
  const text = readFileSync(join(program.folder(), 'plain.html'), 'utf8').replaceAll('http://www.w3.org/2000/svg', '');
  expect(text).not.toMatch(/(?:https?:)?\/\/[a-z0-9.-]+\.[a-z]{2,}/i);
});
