/** A converged run of one bench case: many cells, tight tolerance; prints what errors are measured against. */
import { simulateNow } from '../../src/simulate.ts';
import { others, referenceGlow } from './cases.ts';

const bench = [referenceGlow, ...others].find((b) => b.name === process.argv[2]);
if (!bench) throw new Error(`no case ${process.argv[2]}`);
const outcome = simulateNow(bench.make(600, bench.name === 'relaxation-oscillation' ? 3e-5 : 1e-5));
process.stdout.write(
  JSON.stringify({
    crossings: outcome.currents.map((c) => c.time_s),
    peak: outcome.peak.current_A,
    voltage: outcome.final.gap_voltage_V,
    current: outcome.final.current_A,
    gap_J: outcome.energy.gap_J,
    time: outcome.final.time_s,
  }),
);
