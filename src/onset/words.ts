import { formatQuantity } from '../units/format.ts';

/** Quantities in sentences, in engineering units. */
export const volts = (V: number): string => formatQuantity(V, 'V');
export const seconds = (t: number): string => formatQuantity(t, 's');
/** a time that is only estimated */
export const roughly = (t: number): string => formatQuantity(t, 's', 2);
export const amperes = (I: number): string => formatQuantity(I, 'A');
export const metres = (x: number): string => formatQuantity(x, 'm');
/** a share or a relative change, in per cent with two or three digits */
export const percent = (x: number): string => `${Number((100 * x).toPrecision(x !== 0 && Math.abs(x) < 0.1 ? 2 : 3))} %`;

/** Voltages with as many digits as it takes to tell them apart, six at most. */
export function voltsApart(...values: readonly number[]): string[] {
  for (let digits = 3; ; digits++) {
    const texts = values.map((V) => formatQuantity(V, 'V', digits));
    if (digits >= 6 || new Set(texts).size === new Set(values).size) return texts;
  }
}
