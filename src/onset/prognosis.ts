import type { Case } from '../case.ts';
import { predict, prospects } from '../theory/predict.ts';
import { cautionsOf, withDefaults } from './cautions/index.ts';
import { highestOpenGapVoltage } from './highest-voltage.ts';
import type { Caution } from './outcome.ts';

/** The cautions that can be known without simulating.
 *  @param defaults paths of every default that the case leaves to the program */
export function prognosisCautions(settings: Case, defaults: readonly string[]): Caution[] {
  const voltage = highestOpenGapVoltage(settings);
  return withDefaults(cautionsOf(settings, voltage, predict(settings, voltage), prospects(settings, voltage), null), settings, defaults);
}
