/** Measured orders, and the tables in which tests print them. */

/** log of the error ratio over log of the ratio of sizes, between neighbours */
export function ordersOf(sizes: readonly number[], errors: readonly number[]): number[] {
  return sizes.slice(1).map((size, i) => Math.log(errors[i + 1] / errors[i]) / Math.log(size / sizes[i]));
}

/** Prints a table with a heading line, columns aligned. */
export function printTable(title: string, head: readonly string[], rows: readonly (readonly (string | number)[])[]): void {
  const text = [head, ...rows].map((row) => row.map((v) => (typeof v === 'number' ? short(v) : v)));
  const widths = head.map((_, c) => Math.max(...text.map((row) => row[c].length)));
  const lines = text.map((row) => row.map((cell, c) => cell.padStart(widths[c])).join('  '));
  console.log([title, ...lines].join('\n'));
}

function short(value: number): string {
  if (Number.isInteger(value)) return String(value);
  const size = Math.abs(value);
  return size >= 0.01 && size < 1e4 ? value.toPrecision(5) : value.toExponential(2);
}
