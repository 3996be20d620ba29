import { pathToFileURL } from 'node:url';
import type { Browser, BrowserContextOptions, Page } from 'playwright-core';

/** A page opened from disk, and what it asked for or complained about meanwhile. */
export interface Opened {
  readonly tab: Page;
  /** addresses asked for, but for the page itself and pictures that lie in it */
  readonly requests: readonly string[];
  readonly complaints: readonly string[];
  readonly close: () => Promise<void>;
}

export async function open(browser: Browser, path: string, options: BrowserContextOptions = {}): Promise<Opened> {
  const context = await browser.newContext({ viewport: { width: 1400, height: 900 }, ...options });
  const tab = await context.newPage();
  const [requests, complaints]: [string[], string[]] = [[], []];
  const address = pathToFileURL(path).href;
  tab.on('request', (request) => {
    if (request.url() !== address && !request.url().startsWith('data:')) requests.push(request.url());
  });
  tab.on('console', (message) => complaints.push(`${message.type()}: ${message.text()}`));
  tab.on('pageerror', (error) => complaints.push(String(error)));
  tab.on('dialog', (dialog) => {
    complaints.push(`dialog: ${dialog.message()}`);
    void dialog.dismiss();
  });
  await tab.goto(address);
  await tab.waitForSelector('body[data-ready]', { timeout: 20_000 });
  return { tab, requests, complaints, close: () => context.close() };
}

/** Texts of figures that reach beyond their picture, by more than half a pixel. */
export async function cutOff(tab: Page): Promise<string[]> {
  return (await tab.evaluate(`[...document.querySelectorAll('figure svg')].flatMap((svg) => {
    const frame = svg.getBoundingClientRect();
    return [...svg.querySelectorAll('text')].flatMap((text) => {
      const box = text.getBoundingClientRect();
      const out = box.width > 0 && (box.left < frame.left - 0.5 || box.right > frame.right + 0.5 || box.top < frame.top - 0.5 || box.bottom > frame.bottom + 0.5);
      return out ? [text.textContent] : [];
    });
  })`)) as string[];
}
