import {
  type Alias,
  type Document,
  isAlias,
  isDocument,
  isMap,
  isNode,
  isPair,
  isScalar,
  isSeq,
  Lexer,
  type Node,
  type ParsedNode,
  Parser,
  parseDocument,
  visit,
  type YAMLMap,
  type YAMLSeq,
} from 'yaml';
import { clip } from '../units/index.ts';
import type { Place, Problem, ProblemCode } from './problem.ts';

export const MAX_BYTES = 1_000_000;
export const MAX_DEPTH = 20;
const MAX_ALIASES = 50;
/** words, signs, spaces and line ends; a long case has a few thousand */
const MAX_TOKENS = 50_000;
/** of the text as YAML; one forgotten quote can make thousands */
const MAX_ERRORS = 100;
/** aliases inside aliases multiply; no case needs more entries than this once they are written out */
const MAX_ENTRIES = 20_000;

/** Keys from the root; list items by index. */
export type Path = readonly PropertyKey[];

/** A case's text as YAML nodes, which remember where they stand. */
export interface SourceDocument {
  readonly file: string;
  readonly text: string;
  readonly yaml: Document<ParsedNode>;
  /** where each line starts; the library's own counter loses count after some errors */
  readonly lineStarts: readonly number[];
  /** nodes that a `--set` put in, with the argument's path; they stand in no file */
  readonly set: Map<Node, string>;
  /** paths that a `--set` removed */
  readonly removed: Set<string>;
}

export type ParsedDocument =
  | { readonly ok: true; readonly document: SourceDocument }
  | { readonly ok: false; readonly problems: Problem[] };

/** Parses YAML 1.2 (core schema) within the limits on size, depth, tags and aliases. Never throws. */
export function parseSource(text: string, file: string): ParsedDocument {
  const whole = (code: ProblemCode, expected: string, found: string): ParsedDocument => ({
    ok: false,
    problems: [{ code, file, line: null, column: null, path: '', expected, found, nearest: null }],
  });
  const bytes = Buffer.byteLength(text);
  if (bytes > MAX_BYTES) return whole('too-large', 'at most 1 MB of text', `${(bytes / 1e6).toPrecision(3)} MB`);
  const deep = whole('too-deep', `mappings and lists nested at most ${MAX_DEPTH} deep`, 'deeper nesting');
  const excess = scan(text);
  if (excess === 'depth') return deep;
  if (excess === 'length') return whole('too-large', `at most ${MAX_TOKENS} words and signs`, 'more');

  let yaml: Document<ParsedNode>;
  try {
    yaml = parseDocument(text, {
      version: '1.2',
      schema: 'core',
      merge: false,
      prettyErrors: false,
      logLevel: 'error',
    });
  } catch (error) {
    // the YAML library recurses into nested flow collections
    if (error instanceof RangeError) return deep;
    throw error;
  }
  const document: SourceDocument = { file, text, yaml, lineStarts: startsOfLines(text), set: new Map(), removed: new Set() };
  const at = (offset: number): Place => place(document, offset);
  const problems: Problem[] = [];
  const add = (code: ProblemCode, offset: number, expected: string, found: string): void => {
    problems.push({ code, ...at(offset), path: '', expected, found, nearest: null });
  };

  // a warning is a tag that the core schema does not know; tags are refused below, where the node is
  for (const error of yaml.errors.slice(0, MAX_ERRORS)) {
    const offset = error.pos[0];
    const here =
      clip(
        text
          .slice(offset, offset + 60)
          .split('\n', 1)[0]
          .trim(),
      ) || 'the end of the line';
    if (error.code === 'RESOURCE_EXHAUSTION') return deep;
    if (error.code === 'DUPLICATE_KEY') add('duplicate-key', offset, 'every key once', `${here} again`);
    else if (error.code === 'TAG_RESOLVE_FAILED') add('tag', offset, 'no tags', here);
    else add('yaml', offset, `YAML 1.2 (${clipMessage(error.message)})`, here);
  }
  if (yaml.directives?.yaml.version !== '1.2') add('yaml', 0, 'YAML 1.2', `%YAML ${yaml.directives?.yaml.version}`);

  let aliases = 0;
  let tooDeep = false;
  try {
    visit(yaml, (_, node, ancestors) => {
      if (isPair(node) || isDocument(node) || !isNode(node)) return;
      const depth = ancestors.filter((a) => isMap(a) || isSeq(a)).length;
      const offset = node.range?.[0] ?? 0;
      if (isAlias(node)) aliases++;
      else if (node.tag?.startsWith('!') || (node.tag && !/^tag:yaml\.org,2002:(str|int|float|bool|null|map|seq)$/.test(node.tag)))
        add('tag', offset, 'no tags', clip(node.tag));
      if (depth > MAX_DEPTH || (depth === MAX_DEPTH && (isMap(node) || isSeq(node)))) {
        tooDeep = true;
        add('too-deep', offset, `mappings and lists nested at most ${MAX_DEPTH} deep`, 'deeper nesting');
        return visit.BREAK;
      }
    });
  } catch (error) {
    if (error instanceof RangeError) return deep;
    throw error;
  }
  if (aliases > MAX_ALIASES) add('aliases', 0, `at most ${MAX_ALIASES} aliases`, `${aliases}`);
  if (problems.length === 0 && !tooDeep && yaml.contents !== null && !isMap(yaml.contents) && !isAlias(yaml.contents)) {
    const found = isScalar(yaml.contents) ? clip(String(yaml.contents.value)) : 'a list';
    add('wrong-type', yaml.contents.range[0], 'a mapping with the keys gap, gas, electrodes, seed, supply, observe', found || 'nothing');
  }
  return problems.length > 0 ? { ok: false, problems: dedupe(problems) } : { ok: true, document };
}

/** Whether a text is far beyond the limits. The library composes nodes by recursion, and ten thousand open brackets end the process;
 *  it looks for equal keys in quadratic time. Its tokeniser keeps a stack of its own, which tells the depth without recursion. */
function scan(text: string): 'depth' | 'length' | null {
  const parser = new Parser();
  let tokens = 0;
  for (const lexeme of new Lexer().lex(text)) {
    for (const _ of parser.next(lexeme));
    if (parser.stack.length > 3 * MAX_DEPTH) return 'depth';
    if (++tokens > MAX_TOKENS) return 'length';
  }
  return null;
}

/** The values of the document as plain data (mappings without prototype), with what could not be written out. Never throws. */
export function toPlain(document: SourceDocument): { readonly value: unknown; readonly problems: Problem[] } {
  const problems: Problem[] = [];
  let entries = 0;
  let full = false;
  const add = (code: ProblemCode, node: Node, path: Path, expected: string, found: string): void => {
    problems.push({ code, ...placeOfNode(document, node), path: pathText(path), expected, found, nearest: null });
  };
  const plain = (node: unknown, path: Path, open: readonly Node[]): unknown => {
    if (!isNode(node)) return null;
    if (++entries > MAX_ENTRIES) {
      if (!full) add('aliases', node, path, `at most ${MAX_ENTRIES} entries once aliases are written out`, 'more');
      full = true;
      return undefined;
    }
    if (isScalar(node)) return typeof node.value === 'bigint' ? Number(node.value) : node.value;
    if (isAlias(node)) {
      const target = resolve(document, node);
      if (target === null || open.includes(target)) {
        add(
          'aliases',
          node,
          path,
          target === null ? 'an anchor of that name above it' : 'an alias that does not contain itself',
          `*${clip(node.source)}`,
        );
        return undefined;
      }
      return plain(target, path, [...open, target]);
    }
    if (path.length > MAX_DEPTH) {
      add('too-deep', node, path, `mappings and lists nested at most ${MAX_DEPTH} deep`, 'deeper nesting');
      return undefined;
    }
    if (isSeq(node)) return node.items.map((item, i) => plain(item, [...path, i], [...open, node]));
    if (!isMap(node)) return null;
    const result: Record<string, unknown> = Object.create(null);
    for (const pair of node.items) {
      if (!isScalar(pair.key)) {
        add('yaml', isNode(pair.key) ? pair.key : node, path, 'a word as key', 'a mapping, a list or an alias');
        continue;
      }
      const key = String(pair.key.value);
      result[key] = plain(pair.value, [...path, key], [...open, node]);
    }
    return result;
  };
  return { value: plain(document.yaml.contents, [], []) ?? Object.create(null), problems };
}

/** Where the value (or the key) at a path stands, or its nearest ancestor that is there.
 *
 *  @param offset  characters into a value written on one line; ignored where the text is folded or escaped */
export function locate(document: SourceDocument, path: Path, which: 'key' | 'value' = 'value', offset = 0): Place {
  const { yaml, removed } = document;
  for (let n = path.length; n > 0; n--) {
    const text = pathText(path.slice(0, n));
    if (removed.has(text)) return { file: `--set ${text}`, line: null, column: null };
  }
  let node: unknown = yaml.contents;
  let best: unknown = node;
  let isValue = path.length === 0;
  for (const [k, segment] of path.entries()) {
    const container = isAlias(node) ? resolve(document, node) : node;
    if (isMap(container)) {
      const pair = container.items.find((p) => isScalar(p.key) && String(p.key.value) === String(segment));
      if (!pair) break;
      const last = k === path.length - 1;
      isValue = last && which === 'value' && hasText(pair.value);
      best = last && which === 'key' ? pair.key : hasText(pair.value) ? pair.value : pair.key;
      // a missing entry inside a block mapping reads best at the mapping's key
      if (!last && isMap(pair.value) && !pair.value.flow) best = pair.key;
      node = pair.value;
    } else if (isSeq(container)) {
      const item = container.items[Number(segment)];
      if (!isNode(item)) break;
      best = item;
      node = item;
      isValue = k === path.length - 1;
    } else break;
  }
  if (!isNode(best)) return place(document, 0);
  const found = placeOfNode(document, best);
  if (offset > 0 && isValue && found.line !== null && isScalar(best) && best.range && typeof best.value === 'string') {
    const start = best.range[0];
    const source = document.text;
    if (source.startsWith(best.value, start)) return place(document, start + offset);
    if (source.startsWith(best.value, start + 1)) return place(document, start + 1 + offset);
  }
  return found;
}

/** The node that an alias stands for, null where no such anchor precedes it. */
export function resolve(document: SourceDocument, alias: Alias): Node | null {
  const target = alias.resolve(document.yaml);
  return isNode(target) && !isAlias(target) ? target : null;
}

/** A path as users write it. */
export function pathText(path: Path): string {
  return path.map(String).join('.');
}

export type { Node, YAMLMap, YAMLSeq };

function hasText(node: unknown): boolean {
  return isNode(node) && !(isScalar(node) && node.value === null && node.source === '');
}

function placeOfNode(document: SourceDocument, node: Node): Place {
  const argument = document.set.get(node);
  if (argument !== undefined) return { file: `--set ${argument}`, line: null, column: null };
  return place(document, node.range?.[0] ?? 0);
}

function place(document: SourceDocument, offset: number): Place {
  const { lineStarts, text, file } = document;
  const at = Math.max(0, Math.min(offset, text.length));
  let low = 0;
  let high = lineStarts.length - 1;
  while (low < high) {
    const middle = Math.ceil((low + high) / 2);
    if (lineStarts[middle] <= at) low = middle;
    else high = middle - 1;
  }
  return { file, line: low + 1, column: at - lineStarts[low] + 1 };
}

function startsOfLines(text: string): number[] {
  const starts = [0];
  for (let i = text.indexOf('\n'); i >= 0; i = text.indexOf('\n', i + 1)) starts.push(i + 1);
  return starts;
}

/** A library message that may quote text from outside, on one line and shortened. */
function clipMessage(message: string): string {
  const line = message.split('\n', 1)[0];
  return line.length > 90 ? `${line.slice(0, 89)}…`.replace(/\p{Cc}/gu, '?') : line.replace(/\p{Cc}/gu, '?');
}

function dedupe(problems: readonly Problem[]): Problem[] {
  const seen = new Set<string>();
  return problems.filter((p) => {
    const key = `${p.code}:${p.line}:${p.column}`;
    if (seen.has(key)) return false;
    seen.add(key);
    return true;
  });
}
