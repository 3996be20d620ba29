import type { Form } from '../gases/forms.ts';
import { TOWNSEND } from '../units/constants.ts';
import { NO_BREAK } from './layout.ts';

/** A form as a formula in x, the reduced field E/N in Td; its value in SI.
 *
 *  @example formulaOf({ kind: 'exponential', A: 3.6e-20, B: 5.5e-19 }) // '3.6e-20 exp(−550/x)' */
export function formulaOf(form: Form): string {
  switch (form.kind) {
    case 'constant':
      return number(form.value);
    case 'exponential':
      return term(form.A, `exp(−${number(form.B / TOWNSEND)}/x)`);
    case 'root':
      return term(form.C, `exp(−${number(form.D / Math.sqrt(TOWNSEND))}/√x)`);
    case 'exponential-sum': {
      const terms = form.terms.map(({ amplitude, scale }, k) => {
        const sign = amplitude < 0 ? '− ' : k > 0 ? '+ ' : '';
        return `${sign}${term(Math.abs(amplitude), `exp(−${number(scale / TOWNSEND)}/x)`)}`;
      });
      return `${terms.join(' ')}, not below zero`;
    }
    case 'power':
      // at 100 Td, so that the factor is a number of the size that the coefficient has
      return `${term(form.factor * (100 * TOWNSEND) ** form.exponent, `(x/100)^${number(form.exponent)}`)}; below ${townsend(form.floor)} as there`;
    case 'linear': {
      const slope = form.b * TOWNSEND;
      return `${number(form.a)} ${slope < 0 ? '−' : '+'} ${number(Math.abs(slope))}${NO_BREAK}x, not below zero`;
    }
    case 'linear-drift':
      return `${number(form.w0 / TOWNSEND)}/x + ${number(form.w1)}; below ${townsend(form.floor)} as there`;
    case 'falling':
      return term(form.low, `(1 + (x/${number(form.scale / TOWNSEND)})^${number(form.power)})^−${number(form.fall)}`);
    case 'table': {
      const [first, last] = [form.x[0], form.x[form.x.length - 1]].map((x) => number(x / TOWNSEND));
      const between = form.law === 'growth' ? 'ln y against 1/x' : 'y against ln x';
      return `table of ${form.x.length} rows from ${first} to ${last}${NO_BREAK}Td; ${between}, monotone cubic`;
    }
    case 'joined': {
      const { pieces, blend } = form;
      const texts = pieces.map((piece, k) => {
        const from = piece.from === 0 ? '' : ` from ${townsend(piece.from)}`;
        const to = k === pieces.length - 1 ? '' : ` to ${townsend(pieces[k + 1].from)}`;
        return `${formulaOf(piece.form)}${from}${to}`;
      });
      return `${texts.join('; ')}; joined over ${number(100 * blend)}${NO_BREAK}% of x to either side`;
    }
    default:
      return 'a mean over the gases of a mixture';
  }
}

function term(factor: number, rest: string): string {
  return `${number(factor)} ${rest}`;
}

function townsend(x: number): string {
  return `${number(x / TOWNSEND)}${NO_BREAK}Td`;
}

/** four digits, the sign as it is printed */
export function number(value: number): string {
  const rounded = Number(value.toPrecision(4));
  const size = Math.abs(rounded);
  const text = size !== 0 && (size < 1e-3 || size >= 1e5) ? rounded.toExponential().replace('e+', 'e') : String(rounded);
  return text.startsWith('-') ? `−${text.slice(1)}` : text;
}
