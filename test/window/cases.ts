import { readCase } from '../../src/casefile/index.ts';
import type { WindowRequest } from '../../src/scan/window-session.ts';
import { answerOf, followWindow, type WindowOutcome, windowOutcome } from '../../src/search/window/index.ts';
import { simulateNow } from '../../src/simulate.ts';

/** A quick case: own coefficients, V_s = 209.274 V at 3 Torr, the Paschen minimum of 111 V at 0.62 Torr; 230 V while a balloon climbs from 20 to 50 km. */
export function climbing(more = 'voltage: 230 V', supply = 'step: 230 V'): string {
  return `title: Climbing
gap: { geometry: planar, spacing: 1 cm, area: 10 cm^2 }
gas:
  pressure: 3 Torr
  temperature: 300 K
  coefficients:
    ionisation: { form: exponential, A: 12 1/(cm Torr), B: 180 V/(cm Torr) }
    electron_mobility: 3e5 cm^2 Torr/(V s)
    ion_mobility: 1400 cm^2 Torr/(V s)
    electron_energy: 1 V
    ion_energy: 0.026 V
    reference_temperature: 300 K
electrodes: { left: { ion_yield: 0.07 } }
seed: { cathode_current: 1e-12 A }
supply:
  voltage: { ${supply} }
  series_resistance: 10 kohm
  parallel_capacitance: 100 pF
observe: { until: 2 ms }
numerics: { cells: 50 }
history:
  duration: 200 s
  pressure: { ascent: { from: 20 km, to: 50 km, rate: 150 m/s } }
  ${more}
`;
}

export function readWindow(text: string): Pick<WindowRequest, 'case' | 'window' | 'defaults'> {
  const read = readCase(text, 'climbing.yaml', () => ({ ok: false, reason: 'no tables here' }));
  if (!read.ok || read.window === null) throw new Error(JSON.stringify(read));
  return { case: read.case, window: read.window, defaults: [] };
}

/** The outcome of a case, computed here and now. */
export async function outcomeOf(text: string): Promise<WindowOutcome> {
  const { case: settings, window } = readWindow(text);
  const answer = await followWindow(settings, window, {
    evaluate: async (requests) => requests.map((request) => answerOf(settings, request, simulateNow)),
  });
  return windowOutcome(settings, window, answer, [], '1.2.3');
}
