/** Text with units to SI and back, at the edges only: everything else in this program is SI.
 *
 *  dimension.ts   the kinds of quantity, with the names messages use
 *  symbols.ts     unit symbols and prefixes
 *  expression.ts  products, quotients and powers of symbols
 *  quantity.ts    a number with its unit -> SI
 *  format.ts      SI -> text for people
 *  spelling.ts    the nearest valid spelling of a word
 *  clip.ts        text from outside, shortened and escaped for messages
 *  printable.ts   text from outside made safe for a terminal
 *  constants.ts   physical constants */
export { clip } from './clip.ts';
export { DIMENSIONS, type Dimension, type DimensionName, describeExponents, type Exponents, sameExponents } from './dimension.ts';
export { formatQuantity } from './format.ts';
export { expectation, parseAnyOf, parseQuantity, type QuantityError, unitFactor } from './quantity.ts';
export { nearestSpelling } from './spelling.ts';
