import { otherArms } from './overrides.ts';

/** Setting entries of a case that is plain data already, by the rules of `--set`; what is not on the way is shared, never changed. */

export type Plain = Readonly<Record<string, unknown>>;

export type PlainSet = { readonly ok: true; readonly value: Plain } | { readonly ok: false; readonly expected: string };

/** A copy of a case with one entry set: keys of other arms are removed, mappings on the way are made, the index after the last appends. */
export function setPlain(root: Plain, keys: readonly string[], value: unknown): PlainSet {
  let failed: string | null = null;
  const into = (parent: unknown, depth: number): unknown => {
    if (depth === keys.length) return value;
    const key = keys[depth];
    if (Array.isArray(parent)) {
      const index = /^\d{1,6}$/.test(key) ? Number(key) : Number.NaN;
      if (!(index <= parent.length)) {
        failed = `an index from 0 to ${parent.length} in ${keys.slice(0, depth).join('.')}`;
        return parent;
      }
      const copy = [...parent];
      copy[index] = into(parent[index], depth + 1);
      return copy;
    }
    const there = typeof parent === 'object' && parent !== null ? (parent as Plain) : {};
    const copy: Record<string, unknown> = { ...there };
    const others = otherArms(keys.slice(0, depth), key, (other) => Object.hasOwn(copy, other));
    for (const other of others) if (Object.hasOwn(copy, other)) delete copy[other];
    copy[key] = into(there[key], depth + 1);
    return copy;
  };
  const result = into(root, 0) as Plain;
  return failed === null ? { ok: true, value: result } : { ok: false, expected: failed };
}

/** The entry at a path, undefined where there is none. */
export function getPlain(root: unknown, keys: readonly PropertyKey[]): unknown {
  let value = root;
  for (const key of keys) {
    if (typeof value !== 'object' || value === null || !Object.hasOwn(value, key)) return undefined;
    value = (value as Record<PropertyKey, unknown>)[key];
  }
  return value;
}
