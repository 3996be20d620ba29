/** How figures look, on light and on dark ground. Plain CSS without variables: readers of SVG files know no more. */
export interface Theme {
  readonly ground: string;
  readonly ink: string;
  readonly faint: string;
  readonly grid: string;
  readonly mark: string;
  /** areas: what breaks down, what is marginal */
  readonly alarm: string;
  readonly doubt: string;
  /** colours of curves; dashes tell them apart as well */
  readonly series: readonly [string, string, string, string];
}

export const LIGHT: Theme = {
  ground: '#ffffff',
  ink: '#1d2733',
  faint: '#566273',
  grid: '#dfe3e8',
  mark: '#7d3a52',
  alarm: '#c0392b',
  doubt: '#d9a406',
  series: ['#0a5a8c', '#b3500c', '#3f4a57', '#8e2f74'],
};

export const DARK: Theme = {
  ground: '#141b23',
  ink: '#e6ebf0',
  faint: '#a5b1bf',
  grid: '#2b3643',
  mark: '#f0a3bb',
  alarm: '#ff7b6b',
  doubt: '#f2c53d',
  series: ['#74c4f0', '#f3a95f', '#c6ced8', '#e59bd2'],
};

/** `s1`, `s2`, …: which colour, which dashes, how wide */
const SERIES: readonly (readonly [colour: number, dashes: string, width: number])[] = [
  [0, '', 2],
  [1, '7 4', 1.8],
  [2, '2 3', 1.8],
  [3, '9 3 2 3', 1.8],
  [0, '1 4', 1.8],
  [1, '14 4', 1.4],
];

/** The rules of one theme. @param within  selector in front of each, for pages */
export function figureStyle(theme: Theme, within = ''): string {
  const rule = (selector: string, body: string): string => `${within}${selector}{${body}}`;
  return [
    rule('.figure text', `fill:${theme.ink};font-size:12px;stroke:none`),
    rule('.figure .heading', 'font-size:13px;font-weight:bold'),
    rule('.figure .name,.figure .note', `fill:${theme.faint}`).replace(',.figure .note', `,${within}.figure .note`),
    rule('.figure .ground', `fill:${theme.ground}`),
    rule('.figure .grid', `stroke:${theme.grid};fill:none`),
    rule('.figure .axis path', `stroke:${theme.ink};fill:none`),
    rule('.figure .edge', `stroke:${theme.ink}`),
    rule('.figure .axis .edge', 'fill:none'),
    rule('.figure .halo', `stroke:${theme.ground};stroke-width:4;fill:none;opacity:0.75`),
    rule('.figure .mark .halo', 'stroke-width:3'),
    rule('.figure .mark path:not(.halo)', `stroke:${theme.mark};fill:none;stroke-dasharray:4 2`),
    // its own halo keeps a name readable over curves
    rule('.figure .mark text', `fill:${theme.mark};stroke:${theme.ground};stroke-width:3;paint-order:stroke`),
    rule('.figure .reading', 'font-weight:bold'),
    rule('.figure .curve', 'fill:none;stroke-linejoin:round'),
    ...SERIES.map(([colour, dashes, width], i) =>
      rule(
        `.figure .s${i + 1}`,
        `stroke:${theme.series[colour]};stroke-width:${width}${dashes === '' ? '' : `;stroke-dasharray:${dashes}`}`,
      ),
    ),
    rule('.figure .rings', 'fill:none;stroke-width:1.6;stroke-dasharray:none'),
    rule('.figure .band', `fill:${theme.series[0]};opacity:0.18`),
    rule('.figure .fill-alarm', `fill:${theme.alarm};opacity:0.28`),
    rule('.figure .fill-doubt', `fill:${theme.doubt};opacity:0.28`),
    rule('.figure .hatch', `stroke:${theme.faint};stroke-width:1.2;fill:none;opacity:0.8`),
    rule('.figure .fill-beyond', `fill:none;stroke:${theme.faint};stroke-dasharray:2 2`),
    rule('.figure .dot', `fill:${theme.series[0]};stroke:${theme.ground};stroke-width:1`),
    rule('.figure .dot-alarm', `fill:${theme.alarm}`),
    rule('.figure .dot-doubt', `fill:${theme.doubt}`),
    rule('.figure .dot-beyond', `fill:${theme.ground};stroke:${theme.faint};stroke-width:1.5`),
    rule('.figure .level', `stroke:${theme.ink};stroke-width:1.3;fill:none`),
    rule('.figure .now', `stroke:${theme.ink};stroke-width:1.5;fill:none`),
    rule('.figure .point', `fill:${theme.ground};stroke:${theme.mark};stroke-width:1.8`),
  ].join('\n');
}
