import type { Case } from '../case.ts';
import type { Programme, SupplySettings } from '../supply/settings.ts';

/** The largest |V| [V] that the supply drives at any time, or that the gap holds at t = 0. */
export function largestVoltage({ programme, initialGapVoltage }: SupplySettings): number {
  return valuesOf(programme).reduce((largest, v) => Math.max(largest, Math.abs(v)), Math.abs(initialGapVoltage));
}

/** The case with its whole voltage programme scaled so that its largest |V| is `voltage`; every sign is kept, and every time.
 *
 *  What the gap holds at t = 0 scales too, and counts when the largest |V| is taken. It is what the programme did before the run
 *  (a gap already at its bias, a charged cable): left as it is, a gap charged to its bias would break down from that charge
 *  however low the supply is set. With both scaled, the voltage of the open gap is in proportion to `voltage` at every instant
 *  (a current limit apart), so that one number says how hard the gap is driven. Ramps keep their duration: the rate scales.
 *  Gas, gap, electrodes and everything else are the same objects as in `settings`; title and hash still name the original.
 *
 *  @param voltage [V], > 0
 *  @throws RangeError where no voltage but 0 V is ever applied
 *  @example a ramp from −100 V to −400 V at 50 V/s, scaled to 800 V, goes from −200 V to −800 V at 100 V/s */
export function scaled(settings: Case, voltage: number): Case {
  const { supply } = settings;
  const largest = largestVoltage(supply);
  if (!(largest > 0)) throw new RangeError('the supply never leaves 0 V: there is nothing to scale');
  const factor = voltage / largest;
  // a voltage that is the largest becomes exactly the one asked for
  const scale = (v: number): number => (Math.abs(v) === largest ? Math.sign(v) * voltage : v * factor);
  return {
    ...settings,
    supply: { ...supply, programme: scaledProgramme(supply.programme, factor, scale), initialGapVoltage: scale(supply.initialGapVoltage) },
  };
}

function scaledProgramme(programme: Programme, factor: number, scale: (v: number) => number): Programme {
  switch (programme.kind) {
    case 'step':
      return { ...programme, voltage: scale(programme.voltage) };
    case 'ramp':
      return { ...programme, from: scale(programme.from), to: scale(programme.to), rate: programme.rate * factor };
    case 'table':
      return { ...programme, voltages: programme.voltages.map(scale) };
  }
}

function valuesOf(programme: Programme): readonly number[] {
  switch (programme.kind) {
    case 'step':
      return [programme.voltage];
    case 'ramp':
      return [programme.from, programme.to];
    case 'table':
      return programme.voltages;
  }
}
