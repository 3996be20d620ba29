import type { Case } from '../case.ts';
import { predict, prospects } from '../theory/predict.ts';
import { cautionsOf } from './cautions/index.ts';
import { highestOpenGapVoltage } from './highest-voltage.ts';
import type { Caution } from './outcome.ts';

/** The cautions that can be known without simulating. */
export function prognosisCautions(settings: Case): Caution[] {
  const voltage = highestOpenGapVoltage(settings);
  return cautionsOf(settings, voltage, predict(settings, voltage), prospects(settings, voltage), null);
}
