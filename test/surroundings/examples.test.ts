import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

/** Runs every `@example expression // value` of src/surroundings and of the solver it stands on: the value must agree to the digits it prints. */
const folder = new URL('../../src/surroundings/', import.meta.url);
const files = readdirSync(folder).filter((name) => name.endsWith('.ts'));
const modules = [...files.map((name) => new URL(name, folder)), new URL('../../src/numerics/ode.ts', import.meta.url)];

const examples = modules.flatMap((url) =>
  [...readFileSync(url, 'utf8').matchAll(/@example (.+?) \/\/ (.+?)(?: \*\/)?$/gm)].map(([, expression, value]) => ({
    file: url.pathname.split('/').at(-1) as string,
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
  it.each(examples)('hold in $file: $expression', async ({ expression, value }) => {
    const names: Record<string, unknown> = {};
    for (const url of modules) Object.assign(names, await import(/* @vite-ignore */ url.href));
    const result: unknown = new Function(...Object.keys(names), `return ${expression};`)(...Object.values(names));
    expect(Math.abs((result as number) - Number(value)), `${expression} is ${result}`).toBeLessThanOrEqual(1.02 * lastDigit(value));
  });

  it('stand beside the functions of every file', () => {
    const documented = new Set(examples.map((example) => example.file));
    // these two work on whole settings and have their own tests
    expect(files.filter((file) => !documented.has(file)).sort()).toEqual(['bay.ts', 'history.ts']);
  });
});
