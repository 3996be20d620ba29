import { readCase } from '../../src/casefile/index.ts';
import type { ScanRequest } from '../../src/scan/session.ts';
import { type Study, studyOf } from '../../src/scan/study.ts';
import { openCase } from '../commands/program.ts';

/** The open case on few cells, cheap enough for many points, with a scan. */
export function scanCase(scan: string, changes: Parameters<typeof openCase>[0] = {}): string {
  return openCase({ until: '60 us', ...changes, more: `numerics: { cells: 40, tolerance: 1e-2 }\nscan: ${scan}\n${changes.more ?? ''}` });
}

/** 3 × 4 points around the threshold */
export const GRID = `{ vary: [{ path: gas.pressure, from: 2 Torr, to: 4 Torr, points: 3 },
  { path: supply.voltage.step, values: [150 V, 200 V, 230 V, 260 V] }] }`;

export function studyFor(text: string): Study {
  const read = readCase(text, 'open.yaml', () => ({ ok: false, reason: 'no tables here' }));
  if (!read.ok) throw new Error(JSON.stringify(read.problems));
  const study = studyOf(read, text, 'open.yaml', []);
  if (study === null) throw new Error('no scan');
  return study;
}

export function requestFor(text: string, path: string, more: Partial<ScanRequest> = {}): ScanRequest {
  return {
    study: studyFor(text),
    path,
    shard: null,
    restart: false,
    texts: { caseText: text, coefficientsJson: '{}', tablesJson: '[]' },
    ...more,
  };
}

/** Lines of points without what differs from run to run. */
export function withoutWall(lines: Iterable<string>): string[] {
  return [...lines].map((line) => line.replaceAll(/"wall_s":[^,}]*/g, '"wall_s":0'));
}
