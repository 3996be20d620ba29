/** Two parallel electrodes: x runs from the left one (0) to the right one (spacing). */
export interface PlanarGap {
  readonly geometry: 'planar';
  /** [m] */
  readonly spacing: number;
  /** [m²] */
  readonly area: number;
  /** length of the longest way around the gap that a discharge could take [m], ≥ spacing */
  readonly longestPath: number;
  /** whether the case gave it, or it is the default (the spacing) */
  readonly longestPathGiven: boolean;
}
