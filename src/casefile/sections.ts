import * as z from 'zod';
import type { Plain } from './plain.ts';
import type { CaseInput } from './schema.ts';

/** Reads runs that share most of their sections, as the points of a scan do: a section that is the very object of the run before is not validated
 *  again. Sections know nothing of each other but what the checks of the whole compare, and those are made each time: so the input is the one that
 *  `run` gives.
 *  @returns null where anything is wrong: `run` says what */
export function sectionReader(run: z.ZodType<CaseInput>): (plain: Plain) => CaseInput | null {
  const { shape, def } = run as unknown as z.ZodObject<Readonly<Record<string, z.ZodType>>>;
  const whole = z.looseObject({}).check(...((def.checks ?? []) as z.core.$ZodCheck<object>[]));
  const known = new Map<string, { readonly given: unknown; readonly read: unknown }>();
  return (plain) => {
    if (!Object.keys(plain).every((key) => Object.hasOwn(shape, key))) return null;
    const input: Record<string, unknown> = {};
    for (const [key, schema] of Object.entries(shape)) {
      const given = plain[key];
      let section = known.get(key);
      if (section === undefined || section.given !== given) {
        const result = schema.safeParse(given);
        if (!result.success) return null;
        section = { given, read: result.data };
        known.set(key, section);
      }
      if (section.read !== undefined) input[key] = section.read;
    }
    return whole.safeParse(input).success ? (input as unknown as CaseInput) : null;
  };
}
