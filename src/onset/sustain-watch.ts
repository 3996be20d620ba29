import type { Observer, Step } from '../march/march.ts';
import { carriers } from '../observables/charge.ts';
import { seedShare } from '../observables/walls.ts';
import type { RunContext } from './context.ts';
import { type Distortion, SPACE_CHARGE_DISTORTION } from './distortion.ts';
import { Recent } from './recent.ts';

/** Largest share of the seed in the cathode's emission of a discharge that sustains itself. */
const LARGEST_SEED_SHARE = 0.01;
/** Relative fall over one ion transit that counts as decay. */
const DECAY = 0.01;
/** Gap charge below this share of its peak counts as gone. */
const GONE = 1e-6;
/** The seed's own level is recognised when the seed makes this part of the emission that it makes in a steady state below
 *  threshold, 1 − q. */
const SEED_LEVEL = 0.9;
/** Gap charge below this share of its peak has fallen, not still risen. */
const FALLEN = 0.01;

/** Follows whether the discharge sustains itself, and whether it has died out. */
export class SustainWatch implements Observer {
  readonly #context: RunContext;
  readonly #distortion: Distortion;
  readonly #recentCurrent: Recent;
  readonly #recentCarriers: Recent;
  /** self-sustaining with a distorted field at some time: breakdown */
  brokeDown = false;
  selfSustaining = false;
  /** is the field at the cathode distorted by a tenth now? */
  distorted = false;
  distortion = 0;
  /** q_L now */
  feedback = 0;
  /** ln of the growth of |I| over the last ion transit; null while there is no past to compare with */
  growth: number | null = null;
  /** the same of the charge carriers: what lingers without a field has a current that means nothing */
  carrierGrowth: number | null = null;
  /** number of charge carriers in the gap */
  carriers = 0;
  /** gap charge gone, or fallen to what the seed keeps? */
  faded = false;
  #peakCarriers = 0;
  /** q_L ≥ 1 now, or earlier with no dying out since. A discharge that a high resistance holds just below threshold counts where the
   *  open gap would be above it: its share of seed electrons is 1 − q like that of a driven current, but it would go on without them. */
  #alive = false;

  constructor(context: RunContext, distortion: Distortion) {
    this.#context = context;
    this.#distortion = distortion;
    this.#recentCurrent = new Recent(context.ionTransit);
    this.#recentCarriers = new Recent(context.ionTransit);
  }

  look(step: Step): boolean {
    const { system } = this.#context;
    const { layout, grid } = system;
    const { time, y, current } = step.end;
    const V = y[layout.voltage];
    this.#recentCurrent.add(time, current);
    this.growth = this.#recentCurrent.growth();
    this.feedback = this.#context.feedback(V);
    this.distortion = this.#distortion.of(y);
    this.distorted = this.distortion >= SPACE_CHARGE_DISTORTION;
    this.carriers = carriers(grid, layout, y);
    this.#recentCarriers.add(time, this.carriers);
    this.carrierGrowth = this.#recentCarriers.growth();
    this.#peakCarriers = Math.max(this.#peakCarriers, this.carriers);

    const share = seedShare(system.equations.at, V >= 0, layout.cells);
    const gone = this.#peakCarriers > 0 && this.carriers <= GONE * this.#peakCarriers;
    const withoutSeed = this.feedback >= 1 || this.#context.feedback(step.openGapAt(time)) >= 1;
    const seeded = this.#context.settings.seed.cathodeCurrent > 0 && this.feedback < 1;
    const atSeedLevel = seeded && share >= SEED_LEVEL * (1 - this.feedback);
    this.faded = gone || (atSeedLevel && this.carriers < FALLEN * this.#peakCarriers);
    if (this.feedback >= 1 || (withoutSeed && share < LARGEST_SEED_SHARE)) this.#alive = true;
    else if (gone || atSeedLevel) this.#alive = false;

    // before a whole ion transit has passed only the feedback can tell growth from decay
    const lasting = this.growth === null ? this.feedback >= 1 : this.growth > -DECAY;
    this.selfSustaining = share < LARGEST_SEED_SHARE && current !== 0 && lasting && (this.#alive || this.distorted);
    if (this.selfSustaining && this.distorted) this.brokeDown = true;
    return false;
  }
}
