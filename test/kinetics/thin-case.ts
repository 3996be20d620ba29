/** A small gap in thin argon with few particles. */
import type { Case } from '../../src/case.ts';
import { readCase } from '../../src/casefile/index.ts';

export function thinCase(overrides: readonly string[] = []): Case {
  const text = `
title: Thin argon
gap: { geometry: planar, spacing: 5 mm, area: 4 cm^2 }
gas: { name: argon, pressure: 1.2 Torr }
electrodes: { left: { ion_yield: 0.1 } }
seed: { cathode_current: 10 pA }
supply: { voltage: { step: 180 V }, series_resistance: 100 kohm, parallel_capacitance: 20 pF }
electrons: { closure: kinetic, particles: 640 }
observe: { until: 20 us }
`;
  const read = readCase(text, 'thin.yaml', () => ({ ok: false, reason: 'no tables' }), overrides);
  if (!read.ok) throw new Error(JSON.stringify(read.problems));
  return read.case;
}
