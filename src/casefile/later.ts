import { pathText } from './document.ts';

/** Keys that a case may hold one day, by the mapping they belong to: refused by name, never ignored. */
const KEYS: Readonly<Record<string, readonly string[]>> = {
  gap: ['inner_radius', 'outer_radius', 'length'],
  electrodes: ['inner', 'outer'],
  'electrodes.left': ['photon_yield', 'metastable_yield', 'field_emission'],
  'electrodes.right': ['photon_yield', 'metastable_yield', 'field_emission'],
  seed: ['gas_ionisation'],
};

/** Names that a key may take one day. */
const NAMES: Readonly<Record<string, readonly string[]>> = {
  'gap.geometry': ['coaxial', 'spherical'],
};

export function isLaterKey(parent: readonly PropertyKey[], key: string): boolean {
  const keys = KEYS[pathText(parent)];
  return keys?.includes(key) ?? false;
}

export function isLaterName(path: readonly PropertyKey[], name: unknown): boolean {
  return typeof name === 'string' && (NAMES[pathText(path)]?.includes(name) ?? false);
}
