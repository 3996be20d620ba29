import { ResultFileError } from '../results/errors.ts';
import { runSwarm, type SwarmEnd } from '../scan/swarm-session.ts';
import { printableJson } from '../units/printable.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import { fileFailure } from './file-failure.ts';
import { progressLine } from './progress.ts';
import { listenForStop } from './signals.ts';
import { swarmCautions } from './swarm-cautions.ts';
import { checkSwarmCsvTarget, writeSwarmCsv } from './swarm-csv.ts';
import { swarmJson } from './swarm-json.ts';
import { type SwarmOptions, type SwarmWish, wishOf } from './swarm-request.ts';
import { swarmText } from './swarm-text.ts';
import type { Terminal } from './terminal.ts';

/** Electrons in a uniform field by particles: from cross-sections to the coefficients of a fluid model.
 *  @returns the exit code: 3 where no field has a value
 *  @throws Failure when arguments or the set are wrong, a file cannot be read or written, or it was interrupted */
export async function swarm(gas: string | undefined, options: SwarmOptions, terminal: Terminal): Promise<number> {
  const wish = wishOf(gas, options);
  try {
    if (options.csv !== undefined) checkSwarmCsvTarget(options.csv);
    const { results } = await follow(wish, options, terminal);
    if (options.csv !== undefined) writeSwarmCsv(wish.set, wish.request, results, options.csv);
    const { set, request } = wish;
    const cautions = swarmCautions(set, request.fields, results);
    if (options.json) terminal.out(printableJson(swarmJson(set, request, results, cautions)));
    else if (!options.quiet) terminal.out(swarmText(set, request, results, cautions, options.csv ?? null, terminal));
    return results.some(({ kind }) => kind === 'point') ? EXIT.done : EXIT.failed;
  } catch (thrown) {
    throw thrown instanceof ResultFileError ? fileFailure(thrown) : thrown;
  }
}

async function follow(
  { request }: SwarmWish,
  options: SwarmOptions,
  terminal: Terminal,
): Promise<Extract<SwarmEnd, { readonly kind: 'complete' }>> {
  const stop = listenForStop();
  const line = options.quiet ? null : progressLine(terminal, swarmProgressText);
  try {
    const end = await runSwarm(request, { stop: stop.signal, progress: (done, total) => line?.show({ done, total }) });
    if (end.kind === 'complete') return end;
    const text = `interrupted; ${end.done} of ${request.fields.length} fields were done, nothing was written`;
    throw new Failure(
      stop.exitCode ?? EXIT.interrupted,
      [`gapwake: ${text}`],
      [problemWithoutPlace('interrupted', 'signal', 'the end of the swarm', text)],
    );
  } finally {
    line?.end();
    stop.release();
  }
}

function swarmProgressText({ done, total }: { readonly done: number; readonly total: number }, elapsed: number): string {
  return `${done} of ${total} fields done   ${elapsed.toFixed(0)} s`;
}
