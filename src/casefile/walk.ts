import * as z from 'zod';
import { leafOf } from './fields.ts';

/** A walk through a schema by the keys of a case: which entries there are, and what each accepts. */

/** What an entry may be, once optional and transformed schemas are unwrapped: leaves, mappings, lists and others. */
export function alternatives(schema: z.core.$ZodType): readonly z.core.$ZodType[] {
  if (leafOf(schema) !== null) return [schema];
  if (schema instanceof z.ZodOptional) return alternatives(schema.unwrap());
  if (schema instanceof z.ZodPipe) return alternatives(schema.in);
  if (schema instanceof z.ZodUnion) return schema.options.flatMap(alternatives);
  return [schema];
}

/** What the entry at a path may be; none where the schema has no such path. List items by any index. */
export function schemasAt(schema: z.core.$ZodType, path: readonly PropertyKey[]): readonly z.core.$ZodType[] {
  return path.reduce<readonly z.core.$ZodType[]>(
    (schemas, key) => schemas.flatMap((inner) => child(inner, String(key))),
    alternatives(schema),
  );
}

/** The keys that may stand in the mapping at a path. */
export function keysAt(schema: z.core.$ZodType, path: readonly PropertyKey[]): string[] {
  return [...new Set(schemasAt(schema, path).flatMap((inner) => (inner instanceof z.ZodObject ? Object.keys(inner.shape) : [])))];
}

/** The paths of every quantity and plain number, list items as `0`. */
export function leafPaths(schema: z.core.$ZodType): string[] {
  const below = (inner: z.core.$ZodType): string[] => {
    if (leafOf(inner) !== null) return [''];
    const entries = inner instanceof z.ZodObject ? Object.entries(inner.shape) : inner instanceof z.ZodArray ? [['0', inner.element]] : [];
    return entries.flatMap(([key, value]) =>
      alternatives(value as z.core.$ZodType)
        .flatMap(below)
        .map((rest) => (rest === '' ? `${key}` : `${key}.${rest}`)),
    );
  };
  return [...new Set(alternatives(schema).flatMap(below))];
}

function child(schema: z.core.$ZodType, key: string): readonly z.core.$ZodType[] {
  if (schema instanceof z.ZodObject) return Object.hasOwn(schema.shape, key) ? alternatives(schema.shape[key]) : [];
  if (schema instanceof z.ZodArray) return /^\d{1,6}$/.test(key) ? alternatives(schema.element) : [];
  return [];
}
