/** Oracle: the growth rate of the current of a uniform field with diffusion.
 *
 *  Contains: the largest real eigenvalue λ of the linear problem (no space charge), from its characteristic equation
 *      De n″ − (W_e + α' De) n′ + (α' W_e − λ) n = 0,   α' = α − η,   Γ_e = W_e n − De n′,   n′(d) = 0,
 *      γ_i Γ_p(0) + γ_ph α ∫Γ_e dx = Γ_e(0),
 *  and Γ_p(0) = α ∫ Γ_e w dx, where w(x) is the landing of an ion born at x discounted by e^{−λ × delay}:
 *      Di w″ − W_i w′ − λ w = 0,   w(0) − (Di/W_i) w′(0) = 1,   w′(d) = 0
 *  (the adjoint of the ion equation with n_p′(0) = 0 and no ions from the anode). Electrons and ions are sums of two exponentials
 *  each, so everything is closed; D = 0 is taken exactly. Ionisation and attachment act on the flux, as in the model.
 *  Does not contain: space charge, a field that changes, complex roots. At λ = 0 the gain is the q without diffusion: ionisation by
 *  flux does not see it, so the threshold does not move. */

import type { UniformGap } from './growth-rate.ts';

export interface DiffusiveGap extends UniformGap {
  /** D [m²/s], ≥ 0 */
  readonly electronDiffusion: number;
  readonly ionDiffusion: number;
}

/** c e^{r (x − at)}, with `at` at whichever end keeps it finite */
interface Exponential {
  readonly factor: number;
  readonly rate: number;
  readonly at: number;
}

/** electrons that one electron from the cathode brings forth, discounted by e^{−λ × delay} */
export function diffusiveGain(gap: DiffusiveGap, lambda: number): number {
  const { alpha, spacing: d, ionYield } = gap;
  const flux = electronFlux(gap, lambda);
  const landing = ionLanding(gap, lambda);
  const emitted = flux.reduce((sum, part) => sum + part.factor * Math.exp(-part.rate * part.at), 0);
  let byIons = 0;
  for (const e of flux) for (const i of landing) byIons += e.factor * i.factor * overlap(e, i, d);
  const unity: Exponential = { factor: 1, rate: 0, at: 0 };
  const byPhotons = flux.reduce((sum, e) => sum + e.factor * overlap(e, unity, d), 0);
  return (alpha * (ionYield * byIons + (gap.photonYield ?? 0) * byPhotons)) / emitted;
}

/** λ [1/s], bisected to the last bit */
export function diffusiveGrowthRate(gap: DiffusiveGap): number {
  const { spacing: d, electronSpeed, ionSpeed, ionYield } = gap;
  const scale = 1 / (d * (1 / electronSpeed + (ionYield > 0 ? 1 / ionSpeed : 0)));
  // below this an exponent turns complex and the gain has no meaning
  const ionFloor = gap.ionDiffusion > 0 && ionYield > 0 ? -(ionSpeed ** 2) / (4 * gap.ionDiffusion) : Number.NEGATIVE_INFINITY;
  let low = -scale;
  let high = scale;
  while (diffusiveGain(gap, high) > 1) high *= 2;
  while (diffusiveGain(gap, low) < 1) {
    low *= 2;
    if (low <= ionFloor) throw new Error('diffusive growth rate: decays faster than ions can diffuse');
  }
  for (;;) {
    const middle = (low + high) / 2;
    if (middle <= low || middle >= high) return middle;
    if (diffusiveGain(gap, middle) > 1) low = middle;
    else high = middle;
  }
}

/** the parts of Γ_e, up to one common factor */
function electronFlux(gap: DiffusiveGap, lambda: number): Exponential[] {
  const { spacing: d, electronSpeed: W, electronDiffusion: D } = gap;
  const net = gap.alpha - (gap.eta ?? 0);
  if (D === 0) return [{ factor: 1, rate: net - lambda / W, at: 0 }];
  const b = W + net * D;
  const root = Math.sqrt(b * b - 4 * D * (net * W - lambda));
  const steep = (b + root) / (2 * D);
  const gentle = (net * W - lambda) / (D * steep);
  // n = e^{gentle x} + c e^{steep (x − d)} with n′(d) = 0
  const c = (-gentle * Math.exp(gentle * d)) / steep;
  return [
    { factor: W - D * gentle, rate: gentle, at: 0 },
    { factor: c * (W - D * steep), rate: steep, at: d },
  ];
}

/** the parts of w */
function ionLanding(gap: DiffusiveGap, lambda: number): Exponential[] {
  const { spacing: d, ionSpeed: W, ionDiffusion: D } = gap;
  if (D === 0) return [{ factor: 1, rate: -lambda / W, at: 0 }];
  const root = Math.sqrt(W * W + 4 * D * lambda);
  const steep = (W + root) / (2 * D);
  const gentle = -lambda / (D * steep);
  // w = f [e^{gentle x} + c e^{steep (x − d)}] with w′(d) = 0, then f from the condition at the cathode
  const c = (-gentle * Math.exp(gentle * d)) / steep;
  const atCathode = 1 - (D / W) * gentle + c * Math.exp(-steep * d) * (1 - (D / W) * steep);
  return [
    { factor: 1 / atCathode, rate: gentle, at: 0 },
    { factor: c / atCathode, rate: steep, at: d },
  ];
}

/** ∫₀ᵈ of the product of two parts without their factors */
function overlap(p: Exponential, q: Exponential, d: number): number {
  const rate = p.rate + q.rate;
  const atZero = -p.rate * p.at - q.rate * q.at;
  const atEnd = atZero + rate * d;
  const u = rate * d;
  if (Math.abs(u) < 1e-5) return d * Math.exp(atZero) * (1 + u / 2 + (u * u) / 6);
  return (Math.exp(atEnd) - Math.exp(atZero)) / rate;
}
