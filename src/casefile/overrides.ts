import { isAlias, isCollection, isMap, isNode, isScalar, isSeq, type Node, type Pair, parseDocument, visit } from 'yaml';
import { clip } from '../units/index.ts';
import { pathText, resolve, type SourceDocument } from './document.ts';
import type { Problem } from './problem.ts';

/** Either-ors of a case: setting a key of one arm removes the keys of the others. The path may hold `*` for any key. */
interface EitherOr {
  readonly pattern: readonly string[];
  readonly arms: readonly (readonly string[])[];
  /** keys that go with the arm that is removed: they mean something else beside another one */
  readonly with: readonly string[];
}

const EITHER_OR: readonly EitherOr[] = [
  { at: 'supply.voltage', arms: [['step', 'rise_time'], ['ramp'], ['table']] },
  { at: 'gas.coefficients.ionisation', arms: [['form', 'A', 'B', 'C', 'D'], ['table']] },
  { at: 'gas.coefficients.attachment', arms: [['form', 'A', 'B', 'C', 'D'], ['table']] },
  {
    at: 'gas.coefficients.ionisation',
    arms: [
      ['A', 'B'],
      ['C', 'D'],
    ],
  },
  {
    at: 'gas.coefficients.attachment',
    arms: [
      ['A', 'B'],
      ['C', 'D'],
    ],
  },
  { at: 'scan.vary.*', arms: [['values'], ['from', 'to', 'points', 'spacing']] },
  { at: 'history.pressure', arms: [['table'], ['dataset'], ['ascent'], ['bay']] },
  { at: 'history.pressure.bay.outside', arms: [['pressure'], ['table'], ['ascent']] },
  { at: 'gas', arms: [['name', 'data'], ['mixture']] },
  { at: 'electrodes.*', arms: [['material', 'surface'], ['ion_yield']] },
  // low and high are yields beside one, factors beside the other
  { at: 'electrodes.*.ion_yield', arms: [['typical'], ['table']], with: ['low', 'high'] },
  { at: 'gas.coefficients.*', arms: [['value'], ['K0'], ['table']] },
].map(({ at, arms, with: meaning = [] }: { at: string; arms: string[][]; with?: string[] }) => ({
  pattern: at.split('.'),
  arms,
  with: meaning,
}));

/** Applies `--set PATH=VALUE` arguments, in order, to a parsed case.
 *
 *  PATH: keys joined by dots, list items by index (the index after the last appends). VALUE: one YAML flow value; empty or
 *  `null` removes the key. Setting one arm of an either-or removes the others. What cannot be applied is returned as problems. */
export function applyOverrides(document: SourceDocument, overrides: readonly string[]): Problem[] {
  return overrides.flatMap((override) => applyOne(document, override));
}

function applyOne(document: SourceDocument, override: string): Problem[] {
  const equals = override.indexOf('=');
  const path = (equals < 0 ? override : override.slice(0, equals)).trim();
  const refuse = (expected: string, found: string): Problem[] => [
    { code: 'set', file: `--set ${path}`, line: null, column: null, path, expected, found: clip(found) || 'nothing', nearest: null },
  ];
  if (equals < 0) return refuse('PATH=VALUE', override);
  const keys = path.split('.');
  if (keys.some((key) => key.trim() === '') || keys.length > 20) return refuse('keys joined by dots, as in gap.spacing', path);

  const text = override.slice(equals + 1);
  const value = parseValue(text);
  if (!value.ok) return refuse(value.expected, text);
  if (value.node !== null) markAsSet(document, value.node, path);

  const error = value.node === null ? remove(document, keys) : set(document, keys, value.node, path);
  return error === null ? [] : refuse(error, text);
}

type Value = { readonly ok: true; readonly node: Node | null } | { readonly ok: false; readonly expected: string };

function parseValue(text: string): Value {
  const expected = 'one YAML flow value, as in 420 V, {step: 420 V} or [1 nA, 1 uA]';
  if (text.length > 100_000) return { ok: false, expected: 'at most 100000 characters' };
  try {
    const document = parseDocument(text, { version: '1.2', schema: 'core', merge: false, prettyErrors: false, logLevel: 'error' });
    const { contents } = document;
    if (document.errors.length > 0 || document.warnings.length > 0 || document.directives?.yaml.version !== '1.2')
      return { ok: false, expected };
    if (contents === null || (isScalar(contents) && contents.value === null)) return { ok: true, node: null };
    let flow = true;
    visit(document, (_, node) => {
      if (isCollection(node) && !node.flow) flow = false;
      if (isScalar(node) && (node.type === 'BLOCK_FOLDED' || node.type === 'BLOCK_LITERAL')) flow = false;
      if (isAlias(node) || (isNode(node) && (node.tag !== undefined || ('anchor' in node && node.anchor)))) {
        // the core schema leaves `tag` unset on scalars without one; collections carry their own
        if (!(isCollection(node) && /^tag:yaml\.org,2002:(map|seq)$/.test(node.tag ?? ''))) flow = false;
      }
    });
    return flow ? { ok: true, node: contents } : { ok: false, expected };
  } catch (error) {
    if (error instanceof RangeError) return { ok: false, expected };
    throw error;
  }
}

function markAsSet(document: SourceDocument, node: Node, path: string): void {
  document.set.set(node, path);
  visit(node, (_, inner) => {
    if (isNode(inner)) document.set.set(inner, path);
  });
}

function set(document: SourceDocument, keys: readonly string[], value: Node, path: string): string | null {
  let parent = root(document, path);
  for (const [depth, key] of keys.entries()) {
    const here = keys.slice(0, depth);
    const last = depth === keys.length - 1;
    document.removed.delete(pathText(keys.slice(0, depth + 1)));
    if (isMap(parent)) {
      removeOtherArms(parent, here, key);
      const pair = parent.items.find((p) => isScalar(p.key) && String(p.key.value) === key) as Pair<unknown, unknown> | undefined;
      if (last) {
        if (pair) pair.value = value;
        else parent.items.push(newPair(document, key, value, path));
        if (pair && isNode(pair.key)) pair.key = newKey(document, key, path);
        return null;
      }
      if (!pair) {
        const child = emptyMap(document, path);
        parent.items.push(newPair(document, key, child, path));
        parent = child;
      } else {
        const child = ownCopy(document, pair.value);
        pair.value = isMap(child) || isSeq(child) ? child : emptyMap(document, path);
        parent = pair.value as Node;
      }
    } else if (isSeq(parent)) {
      const index = /^\d{1,6}$/.test(key) ? Number(key) : Number.NaN;
      if (!(index <= parent.items.length)) return `an index from 0 to ${parent.items.length} in ${pathText(here)}`;
      if (last) {
        parent.items[index] = value;
        return null;
      }
      const child = ownCopy(document, parent.items[index]);
      parent.items[index] = isMap(child) || isSeq(child) ? child : emptyMap(document, path);
      parent = parent.items[index] as Node;
    }
  }
  return null;
}

function remove(document: SourceDocument, keys: readonly string[]): string | null {
  let parent: unknown = document.yaml.contents;
  for (const [depth, key] of keys.entries()) {
    const last = depth === keys.length - 1;
    if (isMap(parent)) {
      const index = parent.items.findIndex((p) => isScalar(p.key) && String(p.key.value) === key);
      if (index < 0) return null; // removing what is not there changes nothing
      if (last) {
        parent.items.splice(index, 1);
        document.removed.add(pathText(keys));
        return null;
      }
      const pair = parent.items[index];
      pair.value = ownCopy(document, pair.value) as typeof pair.value;
      parent = pair.value;
    } else if (isSeq(parent)) {
      const index = /^\d{1,6}$/.test(key) ? Number(key) : Number.NaN;
      if (!(index < parent.items.length)) return `an index from 0 to ${parent.items.length - 1} in ${pathText(keys.slice(0, depth))}`;
      if (last) {
        parent.items.splice(index, 1);
        return null;
      }
      parent.items[index] = ownCopy(document, parent.items[index]);
      parent = parent.items[index];
    } else return null;
  }
  return null;
}

function removeOtherArms(map: { items: Pair<unknown, unknown>[] }, here: readonly string[], key: string): void {
  const others = otherArms(here, key, (other) => map.items.some((p) => isScalar(p.key) && p.key.value === other));
  if (others.length > 0) map.items = map.items.filter((p) => !(isScalar(p.key) && others.includes(String(p.key.value))));
}

/** The keys that must go when `key` is set in the mapping at a path.
 *  @param has  which keys the mapping holds */
export function otherArms(here: readonly string[], key: string, has: (key: string) => boolean): readonly string[] {
  return EITHER_OR.flatMap(({ pattern, arms, with: meaning }) => {
    if (pattern.length !== here.length || !pattern.every((p, i) => p === '*' || p === here[i])) return [];
    const others = arms.some((arm) => arm.includes(key)) ? arms.filter((arm) => !arm.includes(key)).flat() : [];
    return others.some(has) ? [...others, ...meaning] : others;
  });
}

/** What an alias stands for is shared with its anchor: a `--set` below it must change this use only. */
function ownCopy(document: SourceDocument, node: unknown): unknown {
  if (!isAlias(node)) return node;
  return resolve(document, node)?.clone() ?? node;
}

function root(document: SourceDocument, path: string): Node {
  if (document.yaml.contents === null || !isMap(document.yaml.contents)) {
    document.yaml.contents = emptyMap(document, path) as typeof document.yaml.contents;
  }
  return document.yaml.contents as Node;
}

function emptyMap(document: SourceDocument, path: string): Node {
  const node = document.yaml.createNode({}) as Node;
  document.set.set(node, path);
  return node;
}

function newKey(document: SourceDocument, key: string, path: string): Node {
  const node = document.yaml.createNode(key) as Node;
  document.set.set(node, path);
  return node;
}

function newPair(document: SourceDocument, key: string, value: Node, path: string): Pair<never, never> {
  const pair = document.yaml.createPair(newKey(document, key, path), value);
  return pair as unknown as Pair<never, never>;
}
