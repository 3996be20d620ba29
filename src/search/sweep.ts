/** Fills a range until no two neighbours are further apart than `ratio`, or there are `most` points: the widest gap (in ratio) is
 *  halved first.
 *
 *  A change of the answer and back between two neighbours goes unseen; that is what `ratio` buys.
 *  @param marks values > 0 that are points in any case, the ends of the range among them
 *  @returns points, rising
 *  @example sweepPoints([1, 16], 2, 4) // [1, 2, 4, 16] */
export function sweepPoints(marks: readonly number[], ratio: number, most: number): number[] {
  const points = [...new Set(marks)].sort((a, b) => a - b);
  while (points.length < most) {
    let widest = 1;
    for (let i = 2; i < points.length; i++) if (points[i] / points[i - 1] > points[widest] / points[widest - 1]) widest = i;
    if (points.length < 2 || points[widest] / points[widest - 1] <= ratio) break;
    points.splice(widest, 0, Math.sqrt(points[widest - 1] * points[widest]));
  }
  return points;
}
