/** Speed of the particle engine on one core, in a fresh process: argon at a reduced field [Td], as `gapwake swarm` follows it. Prints one JSON object. */
import { performance } from 'node:perf_hooks';
import { argon } from '../../src/kinetics/argon.ts';
import { batchOf, combine, pilotOf, swarmGas } from '../../src/kinetics/swarm.ts';

const [fieldText, blocksText] = process.argv.slice(2);
const field = Number(fieldText) * 1e-21;
const gas = swarmGas(argon, 293.15, 'isotropic');
const plan = pilotOf(gas, field, 1, 0, 1e6);
if (plan.kind !== 'plan') throw new Error(plan.kind);
/** batches of one measurement; at least two to be combined */
const BATCHES = 4;
const walls: number[] = [];
const cpus: number[] = [];
let shareOfNull = 0;
for (let block = 0; block <= Number(blocksText); block++) {
  const start = performance.now();
  const cpu = process.cpuUsage();
  const batches = Array.from({ length: BATCHES }, (_, k) => batchOf(gas, field, plan, 1, 0, BATCHES * block + k)).filter(
    (sums) => sums !== null,
  );
  const wall = performance.now() - start;
  const { user, system } = process.cpuUsage(cpu);
  const { collisions, flights } = combine(gas, field, plan, batches);
  // the first one is for the compiler
  if (block === 0) continue;
  walls.push(collisions / (wall / 1e3));
  cpus.push(collisions / ((user + system) / 1e6));
  shareOfNull = 1 - collisions / flights;
}
const sorted = (rates: readonly number[]): number[] => rates.toSorted((a, b) => a - b);
process.stdout.write(
  JSON.stringify({
    collisions_per_s: sorted(walls)[walls.length >> 1],
    best_collisions_per_s: Math.max(...walls),
    collisions_per_cpu_s: sorted(cpus)[cpus.length >> 1],
    share_of_null_collisions: shareOfNull,
    peak_memory_MB: process.resourceUsage().maxRSS / 1024,
  }),
);
