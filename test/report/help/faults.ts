import axe from 'axe-core';
import type { Browser } from 'playwright-core';
import { open } from './opened.ts';

/** Accessibility faults that axe calls serious or critical, one line each. */
export async function seriousFaults(browser: Browser, path: string, colorScheme: 'light' | 'dark'): Promise<string[]> {
  // axe is a script of its own, which the page's policy would rightly refuse
  const { tab, close } = await open(browser, path, { colorScheme, bypassCSP: true });
  await tab.evaluate(axe.source);
  // only colours differ in the dark
  const options = colorScheme === 'dark' ? { runOnly: ['color-contrast'] } : {};
  const violations = (await tab.evaluate(`axe.run(${JSON.stringify(options)}).then(({ violations }) => violations)`)) as axe.Result[];
  await close();
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .map(({ id, nodes }) => `${id}: ${nodes.map(({ target, failureSummary }) => `${target} ${failureSummary}`).join('; ')}`);
}
