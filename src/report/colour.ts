/** Colours of the figures, made in OKLab (Ottosson, "A perceptual color space for image processing", 2020; matrices from memory, checked by the
 *  tests against white, black and the greys): equal steps there look about equally large.
 *
 *  The scale of the maps runs from a deep ink through sea green to pale straw. Its lightness rises evenly from end to end, so that it reads the
 *  same in grey, on paper and to eyes that confuse red and green or blue and yellow; the hue only helps. The path through OKLab is then walked
 *  at equal speed, so that equal steps of the value are equal steps for the eye. */

export type Rgb = readonly [red: number, green: number, blue: number];

/** Lightness, chroma and hue [°] through which the scale passes, evenly spaced in lightness. */
const STATIONS: readonly (readonly [L: number, C: number, h: number])[] = [
  [0.2, 0.065, 290],
  [0.39, 0.105, 262],
  [0.58, 0.1, 195],
  [0.77, 0.13, 140],
  [0.96, 0.07, 100],
];

/** The scale in 256 steps, from low to high. */
export const SCALE: readonly Rgb[] = evenSteps(256);

function evenSteps(count: number): Rgb[] {
  const fine = Array.from({ length: 4001 }, (_, i) => along(i / 4000));
  const length = [0];
  for (let i = 1; i < fine.length; i++) length.push(length[i - 1] + distance(fine[i], fine[i - 1]));
  const whole = length[length.length - 1];
  let at = 0;
  return Array.from({ length: count }, (_, k) => {
    const target = (whole * k) / (count - 1);
    while (at < fine.length - 2 && length[at + 1] < target) at++;
    const share = (target - length[at]) / (length[at + 1] - length[at]);
    return toRgb(fine[at].map((v, i) => v + share * (fine[at + 1][i] - v)) as unknown as Lab);
  });
}

type Lab = readonly [L: number, a: number, b: number];

/** A point of the path: lightness even, colour (a, b) along a smooth curve through the stations. */
function along(s: number): Lab {
  const position = s * (STATIONS.length - 1);
  const k = Math.min(STATIONS.length - 2, Math.floor(position));
  const t = position - k;
  const point = (i: number): readonly [number, number] => {
    const [, C, h] = STATIONS[Math.max(0, Math.min(STATIONS.length - 1, i))];
    return [C * Math.cos((h * Math.PI) / 180), C * Math.sin((h * Math.PI) / 180)];
  };
  const [p0, p1, p2, p3] = [point(k - 1), point(k), point(k + 1), point(k + 2)];
  const smooth = (i: 0 | 1): number =>
    0.5 *
    (2 * p1[i] +
      (p2[i] - p0[i]) * t +
      (2 * p0[i] - 5 * p1[i] + 4 * p2[i] - p3[i]) * t * t +
      (3 * p1[i] - p0[i] - 3 * p2[i] + p3[i]) * t * t * t);
  const [first, last] = [STATIONS[0][0], STATIONS[STATIONS.length - 1][0]];
  return [first + s * (last - first), smooth(0), smooth(1)];
}

function distance(a: Lab, b: Lab): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
}

function toRgb([L, a, b]: Lab): Rgb {
  const l = (L + 0.3963377774 * a + 0.2158037573 * b) ** 3;
  const m = (L - 0.1055613458 * a - 0.0638541728 * b) ** 3;
  const s = (L - 0.0894841775 * a - 1.291485548 * b) ** 3;
  const linear = [
    4.0767416621 * l - 3.3077115913 * m + 0.2309699292 * s,
    -1.2684380046 * l + 2.6097574011 * m - 0.3413193965 * s,
    -0.0041960863 * l - 0.7034186147 * m + 1.707614701 * s,
  ];
  return linear.map((v) => {
    const held = Math.min(1, Math.max(0, v));
    return Math.round(255 * (held <= 0.0031308 ? 12.92 * held : 1.055 * held ** (1 / 2.4) - 0.055));
  }) as unknown as Rgb;
}

export function hex([red, green, blue]: Rgb): string {
  return `#${[red, green, blue].map((v) => v.toString(16).padStart(2, '0')).join('')}`;
}
