import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

/** Runs every `@example expression // value` of src/theory: the value must agree to the digits it prints. */
const folder = new URL('../../src/theory/', import.meta.url);

interface Example {
  readonly file: string;
  readonly expression: string;
  readonly value: string;
}

const files = readdirSync(folder).filter((name) => name.endsWith('.ts'));
const examples: Example[] = files.flatMap((file) =>
  [...readFileSync(new URL(file, folder), 'utf8').matchAll(/@example (.+?) \/\/ (.+?)(?: \*\/)?$/gm)].map(([, expression, value]) => ({
    file,
    expression,
    value: value.trim(),
  })),
);

/** half a unit in the last printed digit */
function lastDigit(text: string): number {
  const [mantissa, exponent] = text.toLowerCase().split('e');
  const decimals = mantissa.split('.')[1]?.length ?? 0;
  return 0.5 * 10 ** (Number(exponent ?? 0) - decimals);
}

describe('the worked numbers in the docstrings', () => {
  it.each(examples)('hold in $file: $expression', async ({ file, expression, value }) => {
    const module = (await import(/* @vite-ignore */ new URL(file, folder).href)) as Record<string, unknown>;
    const result: unknown = new Function(...Object.keys(module), `return ${expression};`)(...Object.values(module));
    if (value.startsWith("'")) expect(result).toBe(value.slice(1, -1));
    else expect(Math.abs((result as number) - Number(value)), `${expression} is ${result}`).toBeLessThanOrEqual(1.02 * lastDigit(value));
  });

  it('stand beside nearly every function', () => {
    const documented = new Set(examples.map((example) => example.file));
    // these work on a whole case and have their own tests
    expect(files.filter((file) => !documented.has(file))).toEqual(['kinetic.ts', 'predict.ts']);
  });
});
