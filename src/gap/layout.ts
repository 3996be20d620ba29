import ndarray from 'ndarray';

/** Where the unknowns of one gap lie in a flat Float64Array.
 *
 *  First the integrated unknowns: species × (2 + cells + 2) densities [1/m³], each row padded with two zeros on either side so
 *  that stencils need no branches; the field at x = 0, the gap voltage and the charges counted since t = 0. Then, derived from
 *  them by Gauss's law, cells + 1 face values of the field [V/m]. */
export interface Layout {
  readonly cells: number;
  readonly species: number;
  /** distance between the rows of two species */
  readonly row: number;
  /** index of cell 0 of species k is k·row + first */
  readonly first: number;
  /** index of E(x = 0) [V/m] among the integrated unknowns */
  readonly leftField: number;
  readonly voltage: number;
  /** charge through the gap's terminals, conduction and displacement [C] */
  readonly terminalCharge: number;
  /** charge delivered by the supply [C] */
  readonly supplyCharge: number;
  /** e∫A Σ q Γ dt at x = 0 and x = d [C] */
  readonly leftWallCharge: number;
  readonly rightWallCharge: number;
  /** how many unknowns are integrated */
  readonly unknowns: number;
  /** index of the field at face 0 */
  readonly field: number;
  readonly size: number;
}

export function makeLayout(cells: number, species: number): Layout {
  const row = cells + 4;
  const leftField = species * row;
  const unknowns = leftField + 6;
  return {
    cells,
    species,
    row,
    first: 2,
    leftField,
    voltage: leftField + 1,
    terminalCharge: leftField + 2,
    supplyCharge: leftField + 3,
    leftWallCharge: leftField + 4,
    rightWallCharge: leftField + 5,
    unknowns,
    field: unknowns,
    size: unknowns + cells + 1,
  };
}

/** Densities of species k at cells, as a view of shape (cells) on y. */
export function densityAtCells(layout: Layout, y: Float64Array, k: number): ndarray.NdArray<Float64Array> {
  return ndarray(y, [layout.cells], [1], k * layout.row + layout.first);
}

/** Field at faces, as a view of shape (cells + 1) on y. */
export function fieldAtFaces(layout: Layout, y: Float64Array): ndarray.NdArray<Float64Array> {
  return ndarray(y, [layout.cells + 1], [1], layout.field);
}
