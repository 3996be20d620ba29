import { predict } from '../../theory/predict.ts';
import { metres } from '../words.ts';
import type { Evidence, Raise } from './evidence.ts';

/** Avalanche size from which on streamers are expected: Raether, Meek give 18 … 20. */
const STREAMER_LIMIT = 18;
/** [V/m]; common practice, from memory */
const EMISSION_FIELD = 1e7;
/** [m]; Peschot et al. 2014 see departures from Paschen's law below 4 µm at 1 atm (second-hand) */
const EMISSION_GAP = 10e-6;
/** Ionisation lengths that a gap needs for α to be well defined; from memory. */
const SHORT_GAP = 2.5;
/** Spacing over the radius of a disc of the electrode's area from which on the field's edges count; from memory. */
const WIDE_GAP = 0.3;

/** Where the plain planar gap without field emission, streamers, edges and insulators ends. */
export function ofGap({ settings, voltage, theory, prospects, found }: Evidence, raise: Raise): void {
  const { spacing, area, longestPath, longestPathGiven } = settings.gap;
  const V_s = theory.static_breakdown_voltage_V;
  const lengths = V_s === null ? theory.alpha_d : predict(settings, Math.sign(voltage || 1) * V_s).alpha_d;
  if (settings.electrons === undefined && V_s !== null && lengths < SHORT_GAP) {
    raise(
      'short-gap',
      `At breakdown the gap is only ${lengths.toPrecision(2)} ionisation lengths wide: too few for α to be well defined.`,
      lengths,
    );
  }
  if (prospects.streamerIntegral >= STREAMER_LIMIT) {
    raise(
      'streamer',
      `One avalanche grows by e^${prospects.streamerIntegral.toPrecision(3)}: a streamer may cross the gap long before the feedback of this model acts.`,
      prospects.streamerIntegral,
    );
  }
  const field = Math.max(found?.largestCathodeField ?? 0, Math.abs(voltage) / spacing);
  if (field > EMISSION_FIELD || spacing < EMISSION_GAP) {
    raise(
      'field-emission',
      `Field emission may start the discharge (${(field / 1e6).toPrecision(3)} MV/m across ${metres(spacing)}); it is not in the model.`,
      field,
    );
  }
  const radius = Math.sqrt(area / Math.PI);
  if (spacing > WIDE_GAP * radius) {
    raise(
      'edges',
      `The gap is wide for its electrodes (${metres(spacing)} against a radius of ${metres(radius)}): at edges and towards walls the field exceeds that of the planar model.`,
      spacing / radius,
    );
  }
  if (longestPathGiven && longestPath > spacing) {
    raise(
      'insulator',
      'The longer path is taken through gas in front of bare metal: tracking along insulators, triple junctions and trapped volumes fire earlier.',
      longestPath,
    );
  }
}
