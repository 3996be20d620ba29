import type { Case } from '../case.ts';
import { kineticGapOf } from '../theory/kinetic.ts';
import type { GapAnswer, GapSetup, GapTask } from './gap-job.ts';
import { createPool } from './pool.ts';

/** Follows the electrons of a case ahead at the voltages that its thresholds and the answer at one voltage will ask for, on all cores. Nothing but time
 *  depends on it: what has not been followed ahead is followed when it is needed.
 *  @param voltage  [V], its sign says which wall is the cathode */
export async function followAhead(settings: Case, voltage: number, stop: AbortSignal): Promise<void> {
  const kinetic = kineticGapOf(settings, voltage);
  if (kinetic === null) return;
  const { response } = kinetic;
  const nodes = kinetic.nodesAround(voltage);
  if (nodes.length < 2) return;
  const tasks: GapTask[] = nodes
    .map((node) => ({ kind: 'node' as const, node, particles: response.share(node) }))
    .sort((a, b) => b.particles - a.particles || b.node - a.node);
  const emission = kinetic.emissionAt(voltage);
  if (voltage !== 0 && emission > 0 && emission <= 1) tasks.push({ kind: 'single', voltage: Math.abs(voltage), emission });
  const { distance, emissionEnergy, seed } = response.gap;
  const setup: GapSetup = { gas: settings.gas, gap: { distance, emissionEnergy, seed } };
  const pool = createPool<GapTask, GapAnswer>({ job: 'gap-yield', setup });
  const interrupt = (): void => pool.interrupt();
  stop.addEventListener('abort', interrupt);
  let next = 0;
  try {
    await pool.run(
      () => tasks[next++],
      (task, answer) => {
        if (!answer.ok) return;
        const { result } = answer;
        if (task.kind === 'node' && result.kind === 'node') response.adopt(task.node, result.found);
        if (task.kind === 'single' && result.kind === 'single') kinetic.adoptChance(task.voltage, result.found);
      },
    );
  } finally {
    stop.removeEventListener('abort', interrupt);
    await pool.close();
  }
}
