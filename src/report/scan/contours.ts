/** Lines of equal value on a grid, as short straight pieces (marching squares, linear between neighbours; common practice). */
export interface Piece {
  readonly x1: number;
  readonly y1: number;
  readonly x2: number;
  readonly y2: number;
}

/** @param xs  places of the columns, rising
 *  @param ys  places of the rows, rising
 *  @param value  at column i and row j; squares with a corner that is no number are left out */
export function contour(xs: readonly number[], ys: readonly number[], value: (i: number, j: number) => number, level: number): Piece[] {
  const pieces: Piece[] = [];
  for (let j = 0; j + 1 < ys.length; j++)
    for (let i = 0; i + 1 < xs.length; i++) {
      const corners = [value(i, j), value(i + 1, j), value(i + 1, j + 1), value(i, j + 1)].map((v) => v - level);
      if (!corners.every(Number.isFinite)) continue;
      const places: readonly (readonly [number, number])[] = [
        [xs[i], ys[j]],
        [xs[i + 1], ys[j]],
        [xs[i + 1], ys[j + 1]],
        [xs[i], ys[j + 1]],
      ];
      const crossings: [number, number][] = [];
      for (let k = 0; k < 4; k++) {
        const [a, b] = [corners[k], corners[(k + 1) % 4]];
        if (a < 0 === b < 0) continue;
        const share = a / (a - b);
        const [p, q] = [places[k], places[(k + 1) % 4]];
        crossings.push([p[0] + share * (q[0] - p[0]), p[1] + share * (q[1] - p[1])]);
      }
      // a saddle has four: joined as they come round the square
      for (let k = 0; k + 1 < crossings.length; k += 2)
        pieces.push({ x1: crossings[k][0], y1: crossings[k][1], x2: crossings[k + 1][0], y2: crossings[k + 1][1] });
    }
  return pieces;
}
