import { existsSync } from 'node:fs';
import { type Browser, chromium } from 'playwright-core';

const PLACES = ['/usr/bin/chromium', '/usr/bin/chromium-browser', '/usr/bin/google-chrome'];

/** The browser of this machine; null where there is none. CHROMIUM names another. */
export function browserPath(): string | null {
  return [process.env.CHROMIUM ?? '', ...PLACES].find((path) => path !== '' && existsSync(path)) ?? null;
}

/** A browser that reaches no network of its own accord. */
export function launch(): Promise<Browser> {
  return chromium.launch({
    executablePath: browserPath() ?? '',
    args: [
      '--no-sandbox',
      '--disable-gpu',
      '--disable-quic',
      '--no-first-run',
      '--disable-background-networking',
      '--disable-component-update',
      '--disable-sync',
    ],
  });
}
