import { about, axis, point, writePoints } from '../../roundtrip/points.ts';

/** A scan file with many points over a grid: made up, no physics. */
export async function writeManyPoints(path: string, columns: number, rows: number, title = 'Made up'): Promise<void> {
  const axes = [
    axis(
      'gas.pressure',
      'Pa',
      Array.from({ length: rows }, (_, i) => 10 * 1.03 ** i),
    ),
    axis(
      'supply.voltage.step',
      'V',
      Array.from({ length: columns }, (_, i) => 100 + 3 * i),
    ),
  ];
  const what = about(axes, { title, coefficientsJson: '{"coefficients":{}}' });
  const points = Array.from({ length: what.total }, (_, i) =>
    point(i, null, [axes[0].values[Math.floor(i / columns)], axes[1].values[i % columns]]),
  );
  await writePoints(path, what, points);
}
