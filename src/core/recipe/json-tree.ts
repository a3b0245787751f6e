import { findNodeAtLocation, parseTree, printParseErrorCode, type Node, type ParseError } from 'jsonc-parser';
import { hint, nearestNames } from '../data/nearest';
import type { Diagnostic } from '../protocol/engine';

/** Deeper nesting than any recipe needs would overflow the parser's stack. */
const MAX_DEPTH = 64;

export interface TextRange {
  readonly from: number;
  readonly to: number;
}

export interface Member {
  readonly key: string;
  readonly value: Node;
  readonly keyNode: Node;
}

/** Parsed JSON (comments and trailing commas allowed) whose problems are collected with positions, never thrown. */
export class JsonTree {
  readonly root: Node | undefined;
  readonly diagnostics: Diagnostic[] = [];
  /** True when the text is not whole JSON: what the parser guessed must not be used. */
  readonly broken: boolean;
  readonly #lineStarts: number[] = [0];

  constructor(text: string) {
    for (let i = text.indexOf('\n'); i >= 0; i = text.indexOf('\n', i + 1)) this.#lineStarts.push(i + 1);
    const deep = tooDeep(text);
    const errors: ParseError[] = [];
    this.root = deep === undefined ? parseTree(text, errors, { allowTrailingComma: true }) : undefined;
    this.broken = deep !== undefined || errors.length > 0;
    if (deep !== undefined)
      this.report(
        { from: deep, to: deep + 1 },
        'json',
        `the document is nested more than ${MAX_DEPTH} levels deep`,
      );
    for (const e of errors) {
      const what = printParseErrorCode(e.error)
        .replace(/([a-z])([A-Z])/g, '$1 $2')
        .toLowerCase();
      this.report(
        { from: e.offset, to: e.offset + Math.max(1, e.length) },
        'json',
        `not valid JSON: ${what}`,
      );
    }
  }

  report(range: TextRange, code: string, message: string, extra: Partial<Diagnostic> = {}): void {
    const { line, column } = this.#place(range.from);
    this.diagnostics.push({
      severity: 'error',
      code,
      message,
      ...range,
      line,
      column,
      suggestions: [],
      ...extra,
    });
  }

  range(node: Node | undefined): TextRange {
    return node ? { from: node.offset, to: node.offset + node.length } : { from: 0, to: 1 };
  }

  /** Range of the deepest part of `path` that exists. */
  at(path: readonly (string | number)[]): TextRange {
    for (let cut = path.length; cut >= 0; cut--) {
      const node = this.root && findNodeAtLocation(this.root, path.slice(0, cut));
      if (node) return this.range(node);
    }
    return this.range(this.root);
  }

  /** Range of the key `key` of the object at `path`. */
  atKey(path: readonly (string | number)[], key: string): TextRange {
    const node = this.root && findNodeAtLocation(this.root, [...path]);
    const member = this.members(node).find((m) => m.key === key);
    return member ? this.range(member.keyNode) : this.at(path);
  }

  members(node: Node | undefined): Member[] {
    if (node?.type !== 'object') return [];
    return (node.children ?? []).flatMap((property) => {
      const keyNode = property.children?.at(0);
      const value = property.children?.at(1);
      return keyNode && value ? [{ key: keyNode.value as string, value, keyNode }] : [];
    });
  }

  get(node: Node | undefined, key: string): Node | undefined {
    return this.members(node).find((m) => m.key === key)?.value;
  }

  /** Reports keys that are not known (unless `known` is undefined) and keys given twice. */
  checkKeys(node: Node, known: readonly string[] | undefined, subject?: string): void {
    const about = subject === undefined ? {} : { subject };
    const seen = new Set<string>();
    for (const { key, keyNode } of this.members(node)) {
      if (seen.has(key)) this.report(this.range(keyNode), 'duplicate-key', `"${key}" is given twice`, about);
      seen.add(key);
      if (known === undefined || known.includes(key)) continue;
      const suggestions = nearestNames(key, known);
      this.report(this.range(keyNode), 'unknown-key', `unknown key "${key}".${hint(suggestions)}`, {
        suggestions,
        ...about,
      });
    }
  }

  /** The member `key` if it has the wanted type; reports when it is missing or of another type. */
  need(node: Node, key: string, type: 'string' | 'array' | 'object', what: string): Node | undefined {
    const child = this.get(node, key);
    if (child?.type === type) return child;
    if (!child)
      this.report({ from: node.offset, to: node.offset + 1 }, 'missing-key', `"${key}" is missing: ${what}`);
    else {
      const word = { string: 'text', array: 'a list', object: 'an object' }[type];
      this.report(this.range(child), 'wrong-type', `"${key}" must be ${word}: ${what}`);
    }
    return undefined;
  }

  #place(offset: number): { line: number; column: number } {
    const starts = this.#lineStarts;
    let lo = 0;
    let hi = starts.length - 1;
    while (lo < hi) {
      const mid = (lo + hi + 1) >> 1;
      if (starts[mid] <= offset) lo = mid;
      else hi = mid - 1;
    }
    return { line: lo + 1, column: offset - starts[lo] + 1 };
  }
}

function tooDeep(text: string): number | undefined {
  let depth = 0;
  let inString = false;
  for (let i = 0; i < text.length; i++) {
    const c = text[i];
    if (inString) {
      if (c === '\\') i++;
      else if (c === '"' || c === '\n') inString = false;
    } else if (c === '"') inString = true;
    else if (c === '{' || c === '[') {
      if (++depth > MAX_DEPTH) return i;
    } else if (c === '}' || c === ']') depth--;
  }
  return undefined;
}
