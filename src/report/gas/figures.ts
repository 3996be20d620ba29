import { curveOf } from '../../gases/curves.ts';
import type { Form } from '../../gases/forms.ts';
import { TOWNSEND } from '../../units/constants.ts';
import { formatQuantity } from '../../units/index.ts';
import { type Element, el } from '../element.ts';
import { round } from '../figure/frame.ts';
import { type Curve, KEY_WIDTH, lineFigure } from '../figure/lines.ts';
import { linear, logarithmic } from '../figure/scale.ts';
import { type FigureFile, svgFile } from '../svg-file.ts';

/** A coefficient to be drawn, with what its source says. */
export interface CoefficientCurve {
  readonly name: string;
  readonly label: string;
  /** of its values */
  readonly unit: string;
  readonly form: Form;
  /** in E/N [V m²]; null where none is stated */
  readonly range: { readonly from: number; readonly to: number } | null;
  readonly source: string;
  readonly status: string;
  /** relative */
  readonly uncertainty: number | null;
  /** the same coefficient in other sets of data */
  readonly others: readonly { readonly set: string; readonly form: Form }[];
}

const WIDTH = 760;
/** [Td] */
const [LOWEST, HIGHEST] = [0.1, 1e5];
const POINTS = 400;
/** looks of other sets of data */
const OTHERS = ['s4', 's3', 's5', 's6'];

/** The coefficient curves of a gas against E/N, each with its range shaded and its source below. */
export function gasFigures(title: string, coefficients: readonly CoefficientCurve[]): FigureFile[] {
  return coefficients.map((coefficient) => ({ name: coefficient.name.replaceAll('_', '-'), svg: svgFile(figure(title, coefficient)) }));
}

function figure(title: string, coefficient: CoefficientCurve): ReturnType<typeof lineFigure> {
  const { name, label, unit, range, others } = coefficient;
  const from = range === null ? LOWEST * 10 : Math.max(LOWEST, range.from / TOWNSEND / 5);
  const to = range === null ? HIGHEST / 10 : Math.min(HIGHEST, (range.to / TOWNSEND) * 5);
  const x = Array.from({ length: POINTS }, (_, k) => from * (to / from) ** (k / (POINTS - 1)));
  const sampled = (form: Form): number[] => {
    const curve = curveOf(form);
    return x.map((td) => curve.valueAt(td * TOWNSEND));
  };
  const values = sampled(coefficient.form);
  const inside = (td: number): boolean => range !== null && td * TOWNSEND >= range.from && td * TOWNSEND <= range.to;
  const curves: Curve[] = [
    ...others.map(({ set, form }, i) => ({ name: set, style: OTHERS[i % OTHERS.length], x, y: sampled(form) })),
    { name: 'extrapolated', style: 's2', x, y: values },
    {
      name: range === null ? 'no range stated' : 'in its range',
      style: 's1',
      x,
      y: values.map((v, i) => (range === null || inside(x[i]) ? v : Number.NaN)),
    },
  ];
  let [low, high] = [Number.POSITIVE_INFINITY, 0];
  for (const { y } of curves)
    for (const v of Array.from(y)) {
      if (!(v > 0)) continue;
      low = Math.min(low, v);
      high = Math.max(high, v);
    }
  // growth begins so steeply that its first decades are of no use
  const least = Math.max(low, high * 1e-6);
  const certainty =
    coefficient.uncertainty === null ? 'uncertainty not stated' : `± ${formatQuantity(coefficient.uncertainty * 100, '')} %`;
  const footer = wrapped(`${coefficient.source} (${coefficient.status}, ${certainty}${range === null ? ', no range stated' : ''})`, 104);
  const shown = unit.replace('^2', '²').replace('^3', '³');
  return lineFigure(
    {
      id: name.replaceAll('_', '-'),
      title: `${title}: ${label}`,
      description: `${label} of ${title} against the reduced field`,
      width: WIDTH,
      height: 340 + footer.length * 15,
      left: 76,
      right: KEY_WIDTH + 50,
      footer,
      curves: range === null ? curves.filter(({ name: key }) => key !== 'extrapolated') : curves,
      areas: range === null ? [] : [{ name: 'range of the data', fill: 'band' }],
      under: (box, scale) => {
        if (range === null) return [];
        const [left, right] = [range.from, range.to].map(
          (v) => box.left + box.width * scale.at(Math.min(to, Math.max(from, v / TOWNSEND))),
        );
        const area: Element = el('rect', {
          class: 'area band',
          x: round(left),
          y: box.top,
          width: round(right - left),
          height: box.height,
        });
        return [area];
      },
    },
    (length) => logarithmic('E/N', 'Td', from, to, { length, apart: 44 }, false),
    (length) =>
      high > 3 * least
        ? logarithmic(`${title}: ${label}`, shown, least, high * 1.2, { length, apart: 20 }, false)
        : linear(`${title}: ${label}`, unit === 'V' ? 'V' : shown, 0, high * 1.1 || 1, { length, apart: 30 }),
  );
}

function wrapped(text: string, width: number): string[] {
  const lines = [''];
  for (const word of text.split(' ')) {
    const last = lines[lines.length - 1];
    if (last !== '' && last.length + 1 + word.length > width) lines.push(word);
    else lines[lines.length - 1] = last === '' ? word : `${last} ${word}`;
  }
  return lines;
}
