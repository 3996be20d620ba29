import { TOWNSEND } from '../units/constants.ts';
import { mobilityFromReduced } from './conversions.ts';
import type { Form } from './forms.ts';

/** μN of an ion in its parent gas: K0 at low field, W ∝ √(E/N) at high field, as resonant charge transfer has it.
 *
 *  K0 (1 + (x/s)^1.5)^−⅓, the shape of the measured mobility of Ar+ in argon.
 *  @param K0     reduced mobility at low field [cm²/(V s)]
 *  @param scale  s [Td] */
export function parentIonMobility(K0: number, scale: number): Form {
  return { kind: 'falling', low: mobilityFromReduced(K0), scale: scale * TOWNSEND, power: 1.5, fall: 1 / 3 };
}

/** μN of an ion that moves as its polarisation of the gas lets it, whatever the field, from its reduced mobility [cm²/(V s)]. */
export function constantMobility(K0: number): Form {
  return { kind: 'constant', value: mobilityFromReduced(K0) };
}
