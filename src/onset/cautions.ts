import type { Case } from '../case.ts';
import { feedback } from '../theory/feedback.ts';
import { type Prospects, predict, type Theory } from '../theory/predict.ts';
import type { Caution, CautionCode } from './outcome.ts';
import { metres, percent, seconds, volts } from './words.ts';

/** Limits at which cautions are raised. Unless a source is named: common practice, from memory. */
const STREAMER_LIMIT = 18; // Raether, Meek: 18 … 20
const EMISSION_FIELD = 1e7; // V/m
const EMISSION_GAP = 10e-6; // m; Peschot et al. 2014 see departures below 4 µm at 1 atm
const SHORT_GAP = 2.5; // ionisation lengths
const COLLISIONLESS = 0.1; // mean free path over gap
const WIDE_GAP = 0.3; // spacing over the radius of a disc of the electrode's area
const COARSE_TOLERANCE = 1e-2;
const OUTSIDE_SHARE = 1e-4; // of all ionisation
const FEW_ELECTRONS = 10;
const LOADING = 0.01;
const CATHODE_CELLS = 10;
const UNDERSHOOT = 1e-3;

/** What a finished run adds to what is known beforehand. */
export interface RunFindings {
  readonly broken: boolean;
  readonly held: boolean;
  readonly arcRisk: boolean;
  readonly thresholdTime: number | null;
  readonly lag: number | null;
  readonly growthRate: number | null;
  readonly electronTransit: number;
  readonly steadyGlow: boolean;
  readonly currentDensity: number;
  readonly largestCathodeField: number;
  readonly outside: readonly { readonly name: string; readonly share: number }[];
  readonly seedDrop: number;
  readonly layerCells: number | null;
  readonly undershoot: number;
}

/** Every caution of a run, or of a case before it is run (`found` null). Safety first. */
export function cautionsOf(settings: Case, voltage: number, theory: Theory, prospects: Prospects, found: RunFindings | null): Caution[] {
  const list: Caution[] = [];
  const raise = (code: CautionCode, text: string, value: number | null): void => {
    list.push({ code, text, value });
  };
  raise(
    'not-a-clearance',
    'A model is no clearance to approach or certify: discharge stored charge, keep interlocks, test at pressure.',
    null,
  );
  if (found?.arcRisk) {
    raise(
      'arc-risk',
      'The current or power density is in the range where a glow turns into an arc; the model ends there.',
      found.currentDensity,
    );
  }
  ofRange(settings, theory, prospects, found, raise);
  ofGeometry(settings, voltage, theory, prospects, found, raise);
  ofSeedAndSurface(settings, voltage, theory, prospects, found, raise);
  ofNumerics(settings, found, raise);
  return list;
}

type Raise = (code: CautionCode, text: string, value: number | null) => void;

function ofRange(settings: Case, theory: Theory, prospects: Prospects, found: RunFindings | null, raise: Raise): void {
  const outside = (found?.outside ?? []).filter((o) => o.share > OUTSIDE_SHARE);
  if (outside.length > 0) {
    const worst = outside[0];
    raise(
      'outside-range',
      `${percent(worst.share)} of the ionisation was made at E/N outside the data of ${words(worst.name)}${outside.length > 1 ? ` (${outside.length} coefficients in all)` : ''}.`,
      worst.share,
    );
  } else if (found === null) {
    const x = prospects.breakdownReducedField;
    const range = settings.gas.coefficients.ionisation.range;
    if (x !== null && range !== null && (x < range.from || x > range.to)) {
      raise(
        'outside-range',
        `E/N at the breakdown voltage, ${(x / 1e-21).toPrecision(3)} Td, lies outside the data of ionisation (${(range.from / 1e-21).toPrecision(3)} to ${(range.to / 1e-21).toPrecision(3)} Td).`,
        x / 1e-21,
      );
    }
  }
  const minimum = theory.paschen_minimum_pd_Pa_m;
  const left = minimum !== null && theory.pd_Pa_m < minimum;
  if (left) {
    raise(
      'left-of-minimum',
      'Left of the Paschen minimum electrons are not in equilibrium with the field; a local α(E/N) is only a guide here.',
      theory.pd_Pa_m / minimum,
    );
    if (!settings.gap.longestPathGiven) {
      raise('longer-path', 'Left of the minimum a longer way round breaks down first: give gap.longest_path.', settings.gap.longestPath);
    }
  }
  if (theory.upper_breakdown_voltage_V !== null) {
    raise(
      'double-valued',
      `Feedback falls below 1 again above ${volts(theory.upper_breakdown_voltage_V)}: the breakdown curve is double-valued.`,
      theory.upper_breakdown_voltage_V,
    );
  }
  const cross = settings.gas.kineticCrossSection;
  if (cross !== null) {
    const path = 1 / (settings.gas.density * cross);
    if (path > COLLISIONLESS * settings.gap.spacing) {
      raise(
        'collisionless',
        `The mean free path, ${metres(path)}, is comparable with the gap: the gas hardly matters and a fluid model does not apply.`,
        path,
      );
    }
  }
  if (found !== null && found.growthRate !== null && found.growthRate * found.electronTransit > 0.3) {
    raise(
      'timescales',
      'The current grows within an electron transit: photons and the electrons’ own inertia, which the model leaves out, matter.',
      found.growthRate * found.electronTransit,
    );
  }
}

function ofGeometry(settings: Case, voltage: number, theory: Theory, prospects: Prospects, found: RunFindings | null, raise: Raise): void {
  const { spacing, area, longestPath } = settings.gap;
  const V_s = theory.static_breakdown_voltage_V;
  const lengths = V_s === null ? theory.alpha_d : predict(settings, Math.sign(voltage || 1) * V_s).alpha_d;
  if (lengths < SHORT_GAP) {
    raise(
      'short-gap',
      `The gap is only ${lengths.toPrecision(2)} ionisation lengths at breakdown: too few for α to be well defined.`,
      lengths,
    );
  }
  if (prospects.streamerIntegral >= STREAMER_LIMIT) {
    raise(
      'streamer',
      `One avalanche grows by e^${prospects.streamerIntegral.toPrecision(3)}: a streamer may cross the gap long before this model’s feedback.`,
      prospects.streamerIntegral,
    );
  }
  const field = Math.max(found?.largestCathodeField ?? 0, Math.abs(voltage) / spacing);
  if (field > EMISSION_FIELD || spacing < EMISSION_GAP) {
    raise(
      'field-emission',
      `Field emission may start the discharge (${(field / 1e6).toPrecision(3)} MV/m, gap ${metres(spacing)}); it is not in the model.`,
      field,
    );
  }
  const radius = Math.sqrt(area / Math.PI);
  if (spacing > WIDE_GAP * radius) {
    raise('edges', 'The gap is wide for its electrodes: fields at edges and to walls exceed the planar model’s.', spacing / radius);
  }
  if (settings.gap.longestPathGiven && longestPath > spacing) {
    raise(
      'insulator',
      'Bare metal only: tracking along insulators, triple junctions and trapped volumes are outside the model.',
      longestPath,
    );
  }
  if (found?.steadyGlow && prospects.normalCathodeFall !== null && found.currentDensity < prospects.normalCathodeFall.currentDensity) {
    raise(
      'partly-covered',
      'The current density is below the normal one: a real glow covers part of the cathode, at lower voltage and higher current density.',
      found.currentDensity / prospects.normalCathodeFall.currentDensity,
    );
  }
}

function ofSeedAndSurface(
  settings: Case,
  voltage: number,
  theory: Theory,
  prospects: Prospects,
  found: RunFindings | null,
  raise: Raise,
): void {
  const seedRate = settings.seed.cathodeCurrent / 1.602176634e-19;
  const lag = found === null ? prospects.timeToSpaceCharge : found.lag;
  if (lag !== null && theory.feedback > 1) {
    const electrons = seedRate * lag * prospects.breakdownProbability + settings.seed.electrons * prospects.breakdownProbability;
    if (electrons < FEW_ELECTRONS) {
      raise(
        'few-electrons',
        `Only ${electrons.toPrecision(2)} seed electrons that could start a discharge come within the lag: the real delay is the wait for one${
          prospects.meanStatisticalLag === null ? '' : `, ${seconds(prospects.meanStatisticalLag)} on average`
        }, and one test that held proves nothing.`,
        electrons,
      );
    }
  }
  if (found?.broken && found.thresholdTime === null) {
    raise(
      'seed-lowers-threshold',
      'It broke down although the feedback never reached 1: so strong a seed lowers the threshold.',
      theory.feedback,
    );
  }
  if (found?.held && found.seedDrop > LOADING) {
    raise(
      'loaded-by-seed',
      `The seed’s current drops ${percent(found.seedDrop)} of the voltage in the series resistance: the gap sees less than the supply.`,
      found.seedDrop,
    );
  }
  const cathode = voltage < 0 ? settings.electrodes.right : settings.electrodes.left;
  const { low, high, typical } = cathode.ionYield;
  if (high > low * 1.001) {
    const alphaD = theory.alpha_d;
    const spread = [feedback(alphaD, 0, 1, low), feedback(alphaD, 0, 1, high)];
    raise(
      'yield-spread',
      `The ion yield is known only as ${low} to ${high} (taken ${typical}): feedback at the highest voltage lies between ${spread[0].toPrecision(2)} and ${spread[1].toPrecision(2)}.`,
      high / low,
    );
  }
}

function ofNumerics(settings: Case, found: RunFindings | null, raise: Raise): void {
  const { tolerance } = settings.numerics;
  if (tolerance > COARSE_TOLERANCE) {
    raise('tolerance', `A tolerance of ${tolerance} is coarse: times and currents may be several per cent off.`, tolerance);
  }
  if (found === null) return;
  if (found.layerCells !== null && found.layerCells < CATHODE_CELLS) {
    raise('cathode-cells', `Only ${found.layerCells} cells lie in the cathode layer: raise numerics.cells.`, found.layerCells);
  }
  if (found.undershoot > UNDERSHOOT) {
    raise(
      'undershoot',
      `Densities undershot zero by ${percent(found.undershoot)} of their peak at a steep front: raise numerics.cells.`,
      found.undershoot,
    );
  }
}

/** camelCase coefficient name as words */
function words(name: string): string {
  return name.replace(/[A-Z]/g, (c) => ` ${c.toLowerCase()}`);
}
