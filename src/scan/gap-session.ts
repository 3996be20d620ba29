import type { Case } from '../case.ts';
import type { GapYield } from '../kinetics/gap-yield.ts';
import { kineticGapOf } from '../theory/kinetic.ts';
import type { GapSetup, GapTask } from './gap-job.ts';
import { createPool } from './pool.ts';

/** Follows the electrons of a case ahead at the voltages that its thresholds and the answer at one voltage will ask for, on all cores. Nothing but time
 *  depends on it: what has not been followed ahead is followed when it is needed.
 *  @param voltage  [V], its sign says which wall is the cathode */
export async function followAhead(settings: Case, voltage: number, stop: AbortSignal): Promise<void> {
  const kinetic = kineticGapOf(settings, voltage);
  if (kinetic === null) return;
  const { response } = kinetic;
  const tasks = kinetic
    .nodesAround(voltage)
    .map((node): GapTask => ({ node, particles: response.share(node) }))
    .sort((a, b) => b.particles - a.particles || b.node - a.node);
  if (tasks.length < 2) return;
  const { distance, emissionEnergy, seed } = response.gap;
  const setup: GapSetup = { gas: settings.gas, gap: { distance, emissionEnergy, seed } };
  const pool = createPool<GapTask, GapYield>({ job: 'gap-yield', setup });
  const interrupt = (): void => pool.interrupt();
  stop.addEventListener('abort', interrupt);
  let next = 0;
  try {
    await pool.run(
      () => tasks[next++],
      ({ node }, answer) => {
        if (answer.ok) response.adopt(node, answer.result);
      },
    );
  } finally {
    stop.removeEventListener('abort', interrupt);
    await pool.close();
  }
}
