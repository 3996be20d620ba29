import { ELEMENTARY_CHARGE, TOWNSEND } from '../units/constants.ts';
import { TABLE_TEMPERATURE, tableInTd } from './conversions.ts';
import { curveOf } from './curves.ts';
import type { Form } from './forms.ts';
import type { Coefficient } from './gas.ts';

/** thermal D/μ [V] at 293.15 K */
const THERMAL = 0.02526;
/** unified atomic mass unit [kg], CODATA 2018 */
const ATOMIC_MASS = 1.6605390666e-27;

/** D/μ [V] along the field of ions that lose their charge to a parent atom in each collision and start again from rest.
 *
 *  D/μ = kT/e + (1 − π/4) M W²/e. Paths between collisions are exponential with the mean λ and take √(2 s/a): by renewal W = √(2 a λ/π), which is the limit of Wannier (1953), and
 *  D = (4/π − 1) λ W/2. Exact for a cold gas and a constant cross-section; the thermal part is added as at low field.
 *
 *  @param mobility  form of μN [1/(m V s)]
 *  @param mass      of the ion [u] */
export function hotIonEnergy(mobility: Form, mass: number): Coefficient {
  const curve = curveOf(mobility);
  const rows = Array.from({ length: 22 }, (_, i) => {
    const td = 10 ** (i / 6 + 0.5); // 3 to 1e4 Td
    const W = curve.valueAt(td * TOWNSEND) * td * TOWNSEND;
    return [td, THERMAL + ((1 - Math.PI / 4) * mass * ATOMIC_MASS * W * W) / ELEMENTARY_CHARGE] as const;
  });
  return {
    form: tableInTd(rows),
    range: null,
    source: 'renewal of an ion by resonant charge transfer, D/μ = kT/e + (1 − π/4) M W²/e, derived in src/gases/hot-ions.ts',
    status: 'computed',
    uncertainty: 0.3,
    referenceTemperature: TABLE_TEMPERATURE,
    note: 'From the drift velocity used here, thermal part held at 293.15 K. Ions cross a gap by drift; breakdown voltage and lag hardly depend on it.',
  };
}
