import { describe, expect, it } from 'vitest';
import { type DiffusiveGap, diffusiveGain, diffusiveGrowthRate } from './diffusive-growth-rate.ts';
import { discountedGain, exactGrowthRate } from './growth-rate.ts';
import { openCase } from './open-case.ts';

function openGap(overvoltage: number, parts: Partial<DiffusiveGap> = {}): DiffusiveGap {
  const field = (openCase.breakdownVoltage * (1 + overvoltage)) / openCase.spacing;
  return {
    alpha: openCase.alpha(field),
    spacing: openCase.spacing,
    ionYield: openCase.ionYield,
    electronSpeed: openCase.electronMobility * field,
    ionSpeed: openCase.ionMobility * field,
    electronDiffusion: openCase.electronMobility * openCase.electronEnergy,
    ionDiffusion: openCase.ionMobility * openCase.ionEnergy,
    ...parts,
  };
}

/** Independent of the characteristic equation: both equations solved at a given λ by central differences of second order
 *  with the wall conditions as written, Γ at half cells, then Richardson. */
function gainByDifferences(gap: DiffusiveGap, lambda: number, cells: number): number {
  const { alpha, spacing, electronSpeed: We, electronDiffusion: De, ionSpeed: Wi, ionDiffusion: Di } = gap;
  const h = spacing / cells;
  // electrons: unit emission at face 0; λ n_k + (Γ_{k+1} − Γ_k)/h = α (Γ_k + Γ_{k+1})/2; outflow W n at the anode by extrapolation
  const flux = (left: number, right: number): number => (We * (left + right)) / 2 - (De * (right - left)) / h;
  // marching from the anode is stable for electrons: start from n = 1 with n′(d) = 0, scale afterwards
  const n = new Float64Array(cells + 1);
  const faces = new Float64Array(cells + 1);
  n[cells] = 1; // mirror value beyond the anode: n′(d) = 0
  n[cells - 1] = 1;
  faces[cells] = We;
  for (let k = cells - 1; k >= 0; k--) {
    // Γ_k from the balance of cell k, then n_{k−1} from Γ_k
    faces[k] = (faces[k + 1] * (1 / h - alpha / 2) + lambda * n[k]) / (1 / h + alpha / 2);
    if (k > 0) n[k - 1] = (faces[k] - (We / 2 - De / h) * n[k]) / (We / 2 + De / h);
  }
  expect(flux(n[0], n[1])).toBeCloseTo(faces[1], 6);
  // ions, towards the cathode: marching from x = 0 with n_p′(0) = 0 is stable; two solutions are combined for Γ_p(d) = 0
  const march = (start: number, source: number): { atCathode: number; atAnode: number } => {
    let p = start;
    let f = Wi * start;
    const first = f;
    for (let k = 0; k < cells; k++) {
      const made = (source * alpha * (faces[k] + faces[k + 1])) / 2;
      f += h * (lambda * p - made);
      // f = Wi (p + next)/2 + Di (next − p)/h
      if (k < cells - 1) p = (f - (Wi / 2 - Di / h) * p) / (Wi / 2 + Di / h);
    }
    return { atCathode: first, atAnode: f };
  };
  const [free, forced] = [march(1, 0), march(0, 1)];
  const start = -forced.atAnode / free.atAnode;
  return (gap.ionYield * start * free.atCathode) / faces[0];
}

describe('the growth rate with diffusion (oracle)', () => {
  it('without diffusion is the exact root, also with attachment and photons', () => {
    for (const parts of [{}, { eta: 40 }, { photonYield: 0.01 }]) {
      const gap = openGap(0.1, { electronDiffusion: 0, ionDiffusion: 0, ...parts });
      expect(diffusiveGrowthRate(gap) / exactGrowthRate(gap)).toBeCloseTo(1, 12);
    }
  });

  it('tends to it as the diffusion vanishes, linearly', () => {
    const exact = exactGrowthRate(openGap(0.1));
    const shift = (share: number): number => {
      const gap = openGap(0.1);
      return (
        diffusiveGrowthRate({ ...gap, electronDiffusion: share * gap.electronDiffusion, ionDiffusion: share * gap.ionDiffusion }) - exact
      );
    };
    expect(shift(0.2) / shift(0.1)).toBeCloseTo(2, 1);
  });

  it('shifts the open case by −1e-4 with ion feedback and by −1 % with photons', () => {
    // source: physics.md, closed forms; an independent study of this model
    const ions = openGap(0.1);
    const byIons = diffusiveGrowthRate(ions) / exactGrowthRate(ions) - 1;
    expect(byIons).toBeLessThan(-0.5e-4);
    expect(byIons).toBeGreaterThan(-2e-4);
    const photons = openGap(0.1, { ionYield: 0, photonYield: 0.07 });
    const byPhotons = diffusiveGrowthRate(photons) / exactGrowthRate(photons) - 1;
    expect(byPhotons).toBeLessThan(-0.005);
    expect(byPhotons).toBeGreaterThan(-0.02);
  });

  it('leaves the threshold where it is', () => {
    for (const overvoltage of [-0.1, 0, 0.3]) {
      const gap = openGap(overvoltage, { electronDiffusion: 300 });
      expect(diffusiveGain(gap, 0) / discountedGain(gap, 0)).toBeCloseTo(1, 12);
    }
  });

  it.each([-3e4, 1e4, 6e4])('has the gain of the equations solved by differences, at λ = %f /s', (lambda) => {
    // diffusion much larger than real, so that it matters
    const gap = openGap(0.1, { electronDiffusion: 300, ionDiffusion: 2 });
    const [coarse, fine] = [gainByDifferences(gap, lambda, 2000), gainByDifferences(gap, lambda, 4000)];
    expect((4 * fine - coarse) / 3 / diffusiveGain(gap, lambda)).toBeCloseTo(1, 5);
    expect(Math.abs(diffusiveGain(gap, lambda) / discountedGain(gap, lambda) - 1)).toBeGreaterThan(1e-4);
  });
});
