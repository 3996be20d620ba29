import type { Case } from '../case.ts';
import { Voltage } from '../supply/programme.ts';
import { predict, prospects } from '../theory/predict.ts';
import { cautionsOf } from './cautions.ts';
import type { Caution } from './outcome.ts';

/** The largest |voltage| the supply reaches within the run, or that the gap holds at its start, with its sign [V]. */
export function highestVoltage(settings: Case): number {
  const supply = Voltage.of(settings.supply.programme);
  const candidates = [settings.supply.initialGapVoltage, supply.at(0), supply.at(settings.observe.until)];
  for (const t of supply.cornersAfter(0)) if (t < settings.observe.until) candidates.push(supply.at(t));
  return candidates.reduce((best, v) => (Math.abs(v) > Math.abs(best) ? v : best), 0);
}

/** The cautions that can be known without simulating. */
export function prognosisCautions(settings: Case): Caution[] {
  const voltage = highestVoltage(settings);
  return cautionsOf(settings, voltage, predict(settings, voltage), prospects(settings, voltage), null);
}
