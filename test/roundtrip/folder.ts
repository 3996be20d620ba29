import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { onTestFinished } from 'vitest';

/** An empty folder that goes when the test ends. */
export function folder(): string {
  const path = mkdtempSync(join(tmpdir(), 'gapwake-results-'));
  onTestFinished(() => rmSync(path, { recursive: true, force: true }));
  return path;
}
