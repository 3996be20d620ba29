/** The functional forms in which coefficients are published, as data.
 *
 *  Every form is a function of the reduced field x = E/N [V m²] (1 Td = 1e-21 V m²), x ≥ 0. */
export type Form =
  /** value, whatever the field */
  | { readonly kind: 'constant'; readonly value: number }
  /** A exp(−B/x); 0 at x = 0 */
  | { readonly kind: 'exponential'; readonly A: number; readonly B: number }
  /** C exp(−D/√x); 0 at x = 0 */
  | { readonly kind: 'root'; readonly C: number; readonly D: number }
  /** Σ aₖ exp(−bₖ/x), clipped at zero from below; 0 at x = 0 */
  | { readonly kind: 'exponential-sum'; readonly terms: readonly { readonly amplitude: number; readonly scale: number }[] }
  /** c xᵖ, with x held at or above `floor` so that it stays finite at x = 0 */
  | { readonly kind: 'power'; readonly factor: number; readonly exponent: number; readonly floor: number }
  /** max(0, a + b x) */
  | { readonly kind: 'linear'; readonly a: number; readonly b: number }
  /** mobility×N from a drift velocity that is linear in x, W = w0 + w1 x: (w0 + w1 x)/x, with x held at or above `floor` */
  | { readonly kind: 'linear-drift'; readonly w0: number; readonly w1: number; readonly floor: number }
  /** m (1 + (x/s)ᵖ)^−q : mobility falling from a low-field value m */
  | { readonly kind: 'falling'; readonly low: number; readonly scale: number; readonly power: number; readonly fall: number }
  /** rows against x; `growth` rows (ionisation, attachment) are interpolated as ln y against 1/x by a monotone cubic,
   *  follow K exp(−B/x) through the first two rows below them and keep the last value above; `plain` rows are
   *  interpolated as y against ln x and keep their end values */
  | { readonly kind: 'table'; readonly law: 'growth' | 'plain'; readonly x: readonly number[]; readonly y: readonly number[] }
  /** pieces in rising order of `from` (the first from 0); joined over `blend` (relative width of x) around each joint */
  | { readonly kind: 'joined'; readonly pieces: readonly { readonly from: number; readonly form: Form }[]; readonly blend: number }
  /** a mean over gases mixed by their fractions, each at the same x.
   *  `sum`: Σ fₖ yₖ; `harmonic`: Σ (fₖ/bₖ) / Σ (fₖ/(bₖ yₖ)), with b from `beside` (1 where left out): Blanc's law, 1/y = Σ fₖ/yₖ for Σ fₖ = 1 without it.
   *  0 where a harmonic mean meets a part that is 0 */
  | {
      readonly kind: 'mixed';
      readonly mean: 'sum' | 'harmonic';
      readonly parts: readonly { readonly fraction: number; readonly form: Form; readonly beside?: Form }[];
    };
