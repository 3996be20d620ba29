import { penningPairs } from '../../gases/levels.ts';
import { penningText } from '../../gases/mixture.ts';
import { collisionsOf } from '../../kinetics/of-case.ts';
import { TOWNSEND } from '../../units/constants.ts';
import { metres, percent, volts } from '../words.ts';
import type { Evidence, Raise } from './evidence.ts';

/** Share of the ionisation of a run made outside the data that is worth a word. */
const OUTSIDE_SHARE = 1e-4;
/** Mean free path over gap from which on the gas hardly matters; common practice, from memory. */
const COLLISIONLESS = 0.1;
/** Gas-kinetic cross-section where the gas is not known [m²]: argon, nitrogen and air lie within a sixth of it. */
const TYPICAL_CROSS_SECTION = 4e-19;
/** Growth within an electron transit, λτ, that the model still describes; a choice of the program. */
const FASTEST_GROWTH = 0.1;

/** pd from which on photons from the gas feed back long before ions do [Pa m], 20 Torr cm: air at 200 to 760 Torr, 1 cm and 2 % overvoltage breaks
 *  down in about 1 µs (Fisher and Bederson, Phys. Rev. 81, 109, 1951; from memory, M), where ions alone need 0.2 ms. */
const DENSE_GAS = 26.7;

/** Where the gas data and the local, collisional picture of the gas end. */
export function ofGas(evidence: Evidence, raise: Raise): void {
  ofData(evidence, raise);
  ofPaschenCurve(evidence, raise);
  ofMixture(evidence, raise);
  const { settings, theory, prospects } = evidence;
  const path = 1 / (settings.gas.density * (settings.gas.kineticCrossSection ?? TYPICAL_CROSS_SECTION));
  if (path > COLLISIONLESS * settings.gap.spacing) {
    raise(
      'collisionless',
      `The mean free path of the gas, ${metres(path)}, is comparable with the gap: electrons cross with few collisions and this model does not apply.`,
      path,
    );
  }
  const growth = (theory.growth_rate_per_s ?? 0) * (prospects.electronTransit ?? 0);
  if (growth > FASTEST_GROWTH) {
    raise(
      'timescales',
      `The current grows by a factor of ${Math.exp(growth).toPrecision(2)} within one electron transit: photons, which the model leaves out, then act before the ions do.`,
      growth,
    );
  } else if (theory.pd_Pa_m > DENSE_GAS && theory.feedback > 1) {
    raise(
      'timescales',
      'In gas as dense as this photons feed back within an electron transit and real lags are up to hundreds of times shorter than ions alone give: take the lag as an upper bound, and no hold on the strength of a short pulse.',
      theory.pd_Pa_m,
    );
  }
}

function ofData({ settings, voltage, prospects, found }: Evidence, raise: Raise): void {
  const outside = (found?.outside ?? []).filter((o) => o.share > OUTSIDE_SHARE);
  if (outside.length > 0) {
    const [worst, ...others] = outside;
    const more = others.length === 0 ? '' : `, and of ${others.map((o) => words(o.name)).join(', ')}`;
    raise(
      'outside-range',
      `${percent(worst.share)} of the ionisation was made at E/N outside the data of ${words(worst.name)}${more}: extrapolated there.`,
      worst.share,
    );
    return;
  }
  if (settings.electrons !== undefined) {
    const { range } = collisionsOf(settings).set;
    if (Math.abs(voltage) > range.to)
      raise(
        'outside-range',
        `Electrons may reach ${volts(Math.abs(voltage)).replace(/V$/, 'eV')}, cross-sections are known up to ${range.to} eV: extrapolated beyond.`,
        Math.abs(voltage),
      );
    return;
  }
  const { breakdownReducedField: x } = prospects;
  const { range } = settings.gas.coefficients.ionisation;
  if (x === null || range === null || (x >= range.from && x <= range.to)) return;
  const [at, from, to] = [x, range.from, range.to].map((field) => `${Number((field / TOWNSEND).toPrecision(3))}`);
  raise(
    'outside-range',
    `E/N at the breakdown voltage, ${at} Td, lies outside the data of ionisation (${from} to ${to} Td): that voltage is extrapolated.`,
    x / TOWNSEND,
  );
}

/** A mixture is built by rules, which no measurement of it stands behind; Penning pairs by name, since they fire below V_s. */
function ofMixture({ settings: { gas } }: Evidence, raise: Raise): void {
  if (gas.mixture === undefined) return;
  const names = gas.mixture.map((part) => part.gas);
  if (gas.coefficients.ionisation.status === 'given') {
    raise(
      'mixture',
      'The gas is a mixture whose ionisation the case gives; what else is needed follows from its gases by mixing rules.',
      names.length,
    );
    return;
  }
  const pairs = penningPairs(names);
  if (pairs.length > 0) {
    raise(
      'mixture',
      `${penningText(pairs)}. The mixing rule leaves it out: the mixture may break down far below V_s, with a trace of the second gas at half of it; give measured ionisation of the mixture or a wide margin.`,
      names.length,
    );
    return;
  }
  raise(
    'mixture',
    `The coefficients of the mixture follow from those of its gases by mixing rules at equal E/N, not from measurements: V_s is known to ${percent(gas.breakdownUncertainty)}.`,
    names.length,
  );
}

function ofPaschenCurve({ settings, theory }: Evidence, raise: Raise): void {
  const minimum = theory.paschen_minimum_pd_Pa_m;
  if (minimum !== null && theory.pd_Pa_m < minimum) {
    if (settings.electrons === undefined)
      raise(
        'left-of-minimum',
        'Left of the Paschen minimum electrons are not in equilibrium with the field: a local α(E/N), and with it the breakdown voltage, is only a guide here.',
        theory.pd_Pa_m / minimum,
      );
    if (!settings.gap.longestPathGiven) {
      raise(
        'longer-path',
        'Left of the Paschen minimum real hardware fires over the longer way round an edge or to the wall, at a lower voltage: give gap.longest_path.',
        settings.gap.longestPath,
      );
    }
  }
  const upper = theory.upper_breakdown_voltage_V;
  if (upper !== null) {
    raise(
      'double-valued',
      `Above ${volts(upper)} the feedback falls below 1 again: more voltage would seem to hold, which real gaps seldom do.`,
      upper,
    );
  }
}

/** a coefficient's camelCase name as words */
function words(name: string): string {
  return name.replace(/[A-Z]/g, (c) => ` ${c.toLowerCase()}`);
}
