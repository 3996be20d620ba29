import fc from 'fast-check';
import { expect, it } from 'vitest';
import type * as z from 'zod';
import { across, pureNumber, section } from '../../src/casefile/fields.ts';
import type { Plain } from '../../src/casefile/plain.ts';
import type { CaseInput } from '../../src/casefile/schema.ts';
import { sectionReader } from '../../src/casefile/sections.ts';

const number = pureNumber('a number', { min: 0, max: 100, text: 'from 0 to 100' }, 1);
/** a case in small: sections that are there or not, a check within one, a check across two, an entry that is no section */
const run = section(
  {
    title: number.optional(),
    left: section({ low: number, high: number.optional() }, 'left').check(
      across(({ low, high }, report) => {
        if (Number(low) > Number(high)) report(['high'], 'not below low', { code: 'inconsistent' });
      }),
    ),
    right: section({ low: number }, 'right').optional(),
  },
  'all',
).check(
  across(({ left, right }, report) => {
    const [a, b] = [left, right] as ({ readonly low: number } | undefined)[];
    if (Number(a?.low) + Number(b?.low) > 100) report(['right', 'low'], 'at most 100 with the other', { code: 'inconsistent' });
  }),
) as unknown as z.ZodType<CaseInput>;

it('reads what the whole schema reads, whatever was read before, or nothing where that finds something wrong', () => {
  const value = fc.constantFrom<unknown>(3, '30', '70 %', 60, 80, 101, 'x');
  // few objects, so that many a run has a section of the run before
  const left = fc.record({ low: value, high: value }, { requiredKeys: [] });
  const right = fc.record({ low: value, more: value }, { requiredKeys: [] });
  const pools = fc.record({ left: fc.array(left, { minLength: 3, maxLength: 4 }), right: fc.array(right, { minLength: 2, maxLength: 3 }) });
  let [read, refused] = [0, 0];
  fc.assert(
    fc.property(pools, fc.infiniteStream(fc.nat()), (pool, numbers) => {
      const pick = <T>(from: readonly T[]): T => from[Number(numbers.next().value) % from.length];
      const reader = sectionReader(run);
      for (let i = 0; i < 20; i++) {
        const point: Record<string, unknown> = {
          left: pick([undefined, ...pool.left]),
          right: pick([undefined, ...pool.right]),
          title: pick([undefined, 3, 'x']),
          other: pick([undefined, undefined, undefined, 1]),
        };
        for (const key of Object.keys(point)) if (point[key] === undefined) delete point[key];
        const whole = run.safeParse(point);
        expect(reader(point as Plain)).toStrictEqual(whole.success ? whole.data : null);
        if (whole.success) read++;
        else refused++;
      }
    }),
    { numRuns: 300 },
  );
  // the comparison means something
  expect(Math.min(read, refused)).toBeGreaterThan(200);
});
