import type { Case } from '../../case.ts';
import type { WindowSettings } from '../../study.ts';
import { type History, historyOf } from '../../surroundings/history.ts';
import { limitsOf } from '../../theory/predict.ts';
import { HoldOffCurve } from './curve.ts';
import { alongPath, atDensity, isSymmetric, type Polarity, type YieldEnd, yieldsSpread } from './instant-case.ts';
import { firstInstants, nextInstants, type View } from './instants.ts';
import { type Evaluate, type HoldOffRequest, type LagRequest, type Request, requestKey } from './request.ts';
import { type Criteria, type Judgement, judge } from './states.ts';
import { ThresholdCurve } from './threshold.ts';
import { type Timescales, timescalesOf } from './timescales.ts';
import { type Instant, type Track, trackOf } from './track.ts';
import { earliestTurnOn, type JudgedInstant, latestTurnOn, lowestHoldOff, type Window, windowsOf } from './windows.ts';

/** An instant of the answer. */
export interface FollowedInstant extends JudgedInstant {
  /** at the high end of the yields [V]: simulated where it decides, else expected; null where the model says nothing or nothing is spread */
  readonly holdOffAtHighYield: number | null;
  /** the path of the lowest breakdown voltage [m]; null where none breaks down */
  readonly path: number | null;
  /** why the model says nothing or a simulation gave no answer; null where neither is so */
  readonly note: string | null;
}

/** What follows from one assumption about the yields. */
export interface Followed<Each extends JudgedInstant = JudgedInstant> {
  readonly instants: readonly Each[];
  readonly windows: readonly Window[];
  readonly lowest: (JudgedInstant & { readonly holdOff: number }) | null;
  /** [s] */
  readonly earliest: number | null;
  readonly latest: number | null;
}

/** What becomes of a gap in its surroundings. */
export interface WindowAnswer extends Followed<FollowedInstant> {
  readonly duration: number;
  /** where |V| is highest over the hold-off voltage: index of the instant; null where there is none */
  readonly worst: number | null;
  /** at the ends of the yields' spread; null where one number is given */
  readonly ends: { readonly low: Followed; readonly high: Followed } | null;
  readonly timescales: Timescales | null;
  /** what a reader should know of the history, one sentence each */
  readonly notes: readonly string[];
  /** simulations made, and requests that could not be completed */
  readonly runs: number;
  readonly failures: readonly string[];
}

export interface Following {
  readonly evaluate: Evaluate;
  /** called before each round of requests */
  readonly progress?: (done: number, asked: number) => void;
}

/** Rounds of looking and looking closer; every round halves at least what an edge is known to. */
const MOST_ROUNDS = 16;
/** Instants that are looked at, at most, and densities that are simulated for them: a schedule may change state thousands of times. */
const MOST_INSTANTS = 20_000;
const MOST_SIMULATED = 600;
/** Densities simulated first, from which the others are expected. */
const PILOTS = 4;
/** Distance of |V| from the expected hold-off voltage at the high end of the yields, in ln V, from which on a simulation need not confirm it. */
const CLEAR = 0.1;
/** Lags that are simulated, at most, and the least overvoltage for which they are: nearer the threshold they grow without limit. */
const MOST_LAGS = 16;
const LEAST_OVERVOLTAGE = 1.02;

const CUT = `The state changes too often to be followed everywhere (${MOST_INSTANTS} instants, ${MOST_SIMULATED} densities at most): some edges are less exact than 0.5 % of the time, and some hold-off voltages are expected from those at densities nearby.`;

/** Follows a gap through its surroundings. Discharges take microseconds to milliseconds and pressures seconds to hours, so each instant is a gap at rest:
 *  what it holds depends on the density N of that instant alone.
 *  Theory gives where to look; the hold-off voltage of every instant of the answer is simulated.
 *  @throws HistoryFailure when the pressure cannot be followed */
export async function followWindow(settings: Case, window: WindowSettings, following: Following): Promise<WindowAnswer> {
  const history = historyFrom(window);
  const track = trackOf(history, window.voltage, isSymmetric(settings));
  const search = new Search(settings, window, track, following);
  await search.look();
  await search.timeLags();
  return search.answer(history);
}

/** The surroundings of a gap could not be followed in time. */
export class HistoryFailure extends Error {
  override readonly name = 'HistoryFailure';
}

function historyFrom(window: WindowSettings): History {
  try {
    return historyOf(window.history);
  } catch (thrown) {
    throw new HistoryFailure(thrown instanceof Error ? thrown.message : String(thrown));
  }
}

class Search {
  readonly #settings: Case;
  readonly #track: Track;
  readonly #criteria: Criteria;
  readonly #following: Following;
  readonly #curves = new Map<string, HoldOffCurve>();
  readonly #spread: boolean;
  readonly #looked: Record<YieldEnd, number[]> = { low: [], typical: [], high: [] };
  readonly #lags = new Map<number, number>();
  readonly #failures: string[] = [];
  #runs = 0;
  #done = 0;
  /** whether more instants or simulations were wanted than there may be */
  #cut = false;

  constructor(settings: Case, { margin }: WindowSettings, track: Track, following: Following) {
    this.#settings = settings;
    this.#track = track;
    this.#criteria = { margin, uncertainty: settings.gas.breakdownUncertainty };
    this.#following = following;
    this.#spread = yieldsSpread(settings);
  }

  /** Looks at instants, and at more of them, until the edges are known. */
  async look(): Promise<void> {
    const first = firstInstants(this.#track, this.#view('typical'));
    await this.#simulate('typical', thinned(first, PILOTS));
    await this.#simulate('typical', first);
    this.#looked.typical = first;
    const ends: readonly YieldEnd[] = this.#spread ? ['typical', 'high', 'low'] : ['typical'];
    for (const end of ends) if (end !== 'typical') this.#looked[end] = [0, this.#track.duration];
    for (let round = 0; round < MOST_ROUNDS; round++) {
      const requests: HoldOffRequest[] = [];
      let added = 0;
      for (const end of ends) {
        await breath();
        const wanted = nextInstants(this.#track, this.#view(end), this.#looked[end]);
        const more = thinned(wanted, MOST_INSTANTS - this.#looked[end].length);
        this.#cut ||= more.length < wanted.length;
        added += more.length;
        this.#looked[end] = [...this.#looked[end], ...more].sort((a, b) => a - b);
        requests.push(...this.#wanted(end, end === 'typical' ? this.#looked[end] : more));
      }
      const affordable = thinned(distinct(requests), MOST_SIMULATED - this.#done);
      this.#cut ||= affordable.length < distinct(requests).length;
      if (added === 0 && affordable.length === 0) return;
      await this.#ask(affordable);
    }
  }

  /** Simulates how long the gap takes to break down, where it is worst and at some of the other instants. */
  async timeLags(): Promise<void> {
    const broken = this.#looked.typical
      .map((time) => ({ instant: this.#track.at(time), over: this.#over(this.#track.at(time)) }))
      .filter(({ instant, over }) => over !== null && over >= LEAST_OVERVOLTAGE && this.#judge('typical', instant).state === 'breaks-down');
    const worst = windowsOf(this.#judged('typical'))
      .map(({ from, to }) => broken.filter(({ instant: { time } }) => time >= from && time <= to))
      .flatMap((within) => within.reduce<typeof within>((best, each) => ((each.over ?? 0) > (best[0]?.over ?? 0) ? [each] : best), []))
      .sort((a, b) => (b.over ?? 0) - (a.over ?? 0))
      .slice(0, MOST_LAGS);
    const others = thinned(broken, MOST_LAGS - worst.length);
    const requests = new Map<string, { readonly request: LagRequest; readonly times: number[] }>();
    for (const { instant } of new Set([...worst, ...others])) {
      for (const request of this.#lagRequests(instant)) {
        const key = requestKey(request);
        const known = requests.get(key) ?? { request, times: [] };
        known.times.push(instant.time);
        requests.set(key, known);
      }
    }
    const asked = [...requests.values()];
    const answers = await this.#evaluate(asked.map(({ request }) => request));
    for (const [i, answer] of answers.entries()) {
      if (answer.kind !== 'lag' || answer.lag === null) continue;
      for (const time of asked[i].times) this.#lags.set(time, Math.min(answer.lag, this.#lags.get(time) ?? Infinity));
    }
  }

  answer(history: History): WindowAnswer {
    const instants = this.#judged('typical');
    const overs = instants.map((instant) => (instant.holdOff === null ? 0 : Math.abs(instant.supply) / instant.holdOff));
    const highest = overs.reduce((a, b) => Math.max(a, b), 0);
    return {
      ...followed(instants),
      duration: this.#track.duration,
      worst: highest > 0 ? overs.indexOf(highest) : null,
      ends: this.#spread ? { low: followed(this.#judged('low')), high: followed(this.#judged('high')) } : null,
      timescales: timescalesOf(this.#settings, this.#track, instants, (instant) =>
        this.#curve('typical', instant.polarity).theory.at(instant.density),
      ),
      notes: [...history.notes, ...this.#shortcomings()],
      runs: this.#runs,
      failures: this.#failures,
    };
  }

  /** What this could not do, one sentence each. */
  #shortcomings(): string[] {
    const silent = [...this.#curves.values()].flatMap((curve) => curve.failures);
    const count = `${silent.length === 1 ? 'one density' : `${silent.length} densities`}`;
    return [
      ...(silent.length > 0 ? [`Simulations gave no answer at ${count}, taken as not holding: ${silent[0]}`] : []),
      ...(this.#cut ? [CUT] : []),
    ];
  }

  /** Simulates the hold-off voltages that decide at some instants. */
  async #simulate(end: YieldEnd, times: readonly number[]): Promise<void> {
    await this.#ask(this.#wanted(end, times));
  }

  async #ask(requests: readonly HoldOffRequest[]): Promise<void> {
    const questions = distinct(requests);
    const answers = await this.#evaluate(questions);
    for (const [i, request] of questions.entries()) this.#curve(request.yields, request.polarity).learn(request, answers[i]);
  }

  async #evaluate(requests: readonly Request[]): ReturnType<Evaluate> {
    if (requests.length === 0) return [];
    this.#following.progress?.(this.#done, requests.length);
    const answers = await this.#following.evaluate(requests);
    this.#done += requests.length;
    for (const answer of answers) {
      this.#runs += answer.runs;
      if (answer.kind === 'failed') this.#failures.push(answer.reason);
    }
    return answers;
  }

  /** Hold-off voltages that decide the state at some instants and have not been simulated. */
  #wanted(end: YieldEnd, times: readonly number[]): HoldOffRequest[] {
    const requests: HoldOffRequest[] = [];
    const add = (curve: HoldOffCurve, { density }: Instant): void => {
      if (curve.isSimulated(density) || curve.theory.beyond(density) !== null) return;
      const request = curve.request(density);
      if (request !== null) requests.push(request);
    };
    for (const instant of times.map((t) => this.#track.at(t))) {
      add(this.#curve(end, instant.polarity), instant);
      if (end === 'typical' && this.#spread && this.#highDecides(instant)) add(this.#curve('high', instant.polarity), instant);
    }
    return requests;
  }

  /** Whether it takes the high end of the yields to tell `marginal` from `holds`, and |V| is too near its hold-off voltage to go by the expected one. */
  #highDecides(instant: Instant): boolean {
    const voltage = Math.abs(instant.voltage);
    const [typical, high] = (['typical', 'high'] as const).map((end) => this.#holdOff(end, instant));
    if (voltage === 0 || typical === null || high === null || voltage * this.#criteria.margin >= typical) return false;
    return Math.abs(Math.log(voltage / high)) < CLEAR;
  }

  #view(end: YieldEnd): View {
    return { judge: (instant) => this.#judge(end, instant), holdOff: (instant) => this.#holdOff(end, instant) };
  }

  #holdOff(end: YieldEnd, { density, polarity }: Instant): number | null {
    const curve = this.#curve(end, polarity);
    return curve.beyond(density) === null ? curve.at(density) : null;
  }

  #judge(end: YieldEnd, instant: Instant): Judgement {
    const { density, polarity, voltage } = instant;
    const curve = this.#curve(end, polarity);
    const high = end === 'typical' && this.#spread ? this.#curve('high', polarity) : curve;
    return judge(
      {
        voltage: Math.abs(voltage),
        holdOff: this.#holdOff(end, instant),
        holdOffAtHighYield: high === curve ? null : this.#holdOff('high', instant),
        beyond: curve.beyond(density),
        belowData: curve.theory.belowData(density),
        minimum: curve.theory.minimum,
        minimumAtHighYield: high.theory.minimum,
      },
      this.#criteria,
    );
  }

  /** |V| over the hold-off voltage. */
  #over(instant: Instant): number | null {
    const holdOff = this.#holdOff('typical', instant);
    return holdOff === null ? null : Math.abs(instant.voltage) / holdOff;
  }

  /** A gap breaks down along the path of the lowest threshold, or across its spacing if that is above threshold too, whichever is faster. */
  #lagRequests(instant: Instant): LagRequest[] {
    const { density, polarity } = instant;
    const voltage = Number(Math.abs(instant.voltage).toPrecision(6));
    const threshold = this.#curve('typical', polarity).theory.at(density);
    if (threshold === null) return [];
    const there = Number(density.toPrecision(5));
    const { spacing } = this.#settings.gap;
    const paths = [Number(threshold.path.toPrecision(6))];
    const direct = limitsOf(alongPath(atDensity(this.#settings, there), spacing, polarity), polarity).threshold.breakdown;
    if (threshold.path > spacing * 1.001 && direct !== null && voltage > direct * LEAST_OVERVOLTAGE) paths.push(spacing);
    return paths.map((path) => ({ kind: 'lag', density: there, polarity, path, voltage }));
  }

  #judged(end: YieldEnd): FollowedInstant[] {
    return this.#looked[end].map((time) => {
      const instant = this.#track.at(time);
      const curve = this.#curve(end, instant.polarity);
      const { pressure, temperature, voltage } = instant;
      return {
        time,
        pressure,
        temperature,
        supply: voltage,
        holdOff: this.#holdOff(end, instant),
        holdOffAtHighYield: end === 'typical' && this.#spread ? this.#holdOff('high', instant) : null,
        path: curve.theory.at(instant.density)?.path ?? null,
        judgement: this.#judge(end, instant),
        lag: end === 'typical' ? (this.#lags.get(time) ?? null) : null,
        note: curve.failureAt(instant.density) ?? curve.beyond(instant.density),
      };
    });
  }

  #curve(end: YieldEnd, polarity: Polarity): HoldOffCurve {
    const key = `${end} ${polarity}`;
    let curve = this.#curves.get(key);
    if (curve === undefined) {
      curve = new HoldOffCurve(new ThresholdCurve(this.#settings, polarity, end), polarity, end);
      this.#curves.set(key, curve);
    }
    if (end !== 'typical') curve.lean(this.#curve('typical', polarity));
    return curve;
  }
}

function followed<Each extends JudgedInstant>(instants: readonly Each[]): Followed<Each> {
  return {
    instants,
    windows: windowsOf(instants),
    lowest: lowestHoldOff(instants),
    earliest: earliestTurnOn(instants),
    latest: latestTurnOn(instants),
  };
}

/** Lets the event loop look at signals. */
function breath(): Promise<void> {
  return new Promise((resume) => setImmediate(resume));
}

/** Each question once. */
function distinct(requests: readonly HoldOffRequest[]): HoldOffRequest[] {
  return [...new Map(requests.map((request) => [requestKey(request), request])).values()];
}

/** A few of many, evenly. */
function thinned<T>(all: readonly T[], count: number): T[] {
  if (all.length <= count) return [...all];
  return Array.from({ length: Math.max(0, count) }, (_, i) => all[Math.floor(((i + 0.5) * all.length) / count)]);
}
