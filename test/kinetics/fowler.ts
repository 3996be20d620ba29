import type { CrossSectionSet } from '../../src/kinetics/cross-sections.ts';

/** Ions that an electron makes until it and all that it makes are too slow, without a field, by what happens at its next collision (Fowler's equation):
 *      n(E) = [Σ_x Q_x n(E − ε_x) + Σ_i Q_i ⟨1 + n(ε) + n(E − I − ε)⟩] / (Σ_x Q_x + Σ_i Q_i),
 *  ⟨⟩ over energies ε of the ejected electron by Opal, Peterson and Beaty. Recoil is left out. R. H. Fowler, Proc. Camb. Phil. Soc. 21, 531, 1923
 *  (from memory, M). It shares the cross-sections with src, nothing else.
 *  @param energy  of the first electron [eV] */
export function ionsMade(set: CrossSectionSet, energy: number): number {
  const step = 0.5;
  const made = new Float64Array(Math.round(energy / step) + 1);
  const at = (e: number): number => {
    if (e <= 0) return 0;
    const k = Math.floor(e / step);
    return made[k] + (made[k + 1] - made[k]) * (e / step - k);
  };
  const width = set.sharing.kind === 'opal' ? set.sharing.width : null;
  if (width === null) throw new Error('for ejected electrons of a known width');
  const shares = Array.from({ length: 16 }, (_, i) => (i + 0.5) / 16);
  for (let k = 1; k < made.length; k++) {
    const e = k * step;
    let total = 0;
    let sum = 0;
    for (const { kind, threshold, crossSection } of set.processes) {
      if (threshold === 0 || e <= threshold) continue;
      const q = crossSection(e);
      if (kind === 'ionisation') {
        const left = e - threshold;
        for (const share of shares) {
          const ejected = width * Math.tan(share * Math.atan(left / 2 / width));
          sum += (q / shares.length) * (1 + at(ejected) + at(left - ejected));
        }
        total += q;
      } else if (threshold < step) {
        // n(E) itself is on both sides
        sum += q * (threshold / step) * made[k - 1];
        total += q * (threshold / step);
      } else {
        sum += q * at(e - threshold);
        total += q;
      }
    }
    made[k] = total > 0 ? sum / total : 0;
  }
  return made[made.length - 1];
}
