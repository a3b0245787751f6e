import {
  findNodeAtLocation,
  getNodeValue,
  parseTree,
  printParseErrorCode,
  type Node,
  type ParseError,
} from 'jsonc-parser';
import { hint, nearestNames } from '../data/nearest';
import type { Diagnostic } from '../protocol/engine';
import type { Expectation, InputSpec, Recipe, StepSpec } from './recipe';
import { STEP_KEYS } from './recipe';

/** A recipe with the places its parts stand at. `recipe` is absent when the text is too broken to mean anything. */
export interface ParsedRecipe {
  readonly recipe?: Recipe;
  readonly diagnostics: Diagnostic[];
  /** Node of a JSON path such as ["steps", 0, "do"], for diagnostics found later. */
  at(path: readonly (string | number)[]): { from: number; to: number };
  report(at: { from: number; to: number }, code: string, message: string, extra?: Partial<Diagnostic>): void;
}

const TOP_KEYS = ['$schema', 'fringe', 'title', 'sites', 'inputs', 'steps', 'expect'];
const INPUT_KEYS = ['file', 'channel', 'start', 'duration', 'rate', 'epoch', 'unit', 'scale'];
const NAME = /^[A-Za-z][A-Za-z0-9_-]*$/;
const MAX_DEPTH = 64;

function lineIndex(text: string): (offset: number) => { line: number; column: number } {
  const starts = [0];
  for (let i = text.indexOf('\n'); i >= 0; i = text.indexOf('\n', i + 1)) starts.push(i + 1);
  return (offset) => {
    let lo = 0;
    let hi = starts.length - 1;
    while (lo < hi) {
      const mid = (lo + hi + 1) >> 1;
      if (starts[mid]! <= offset) lo = mid;
      else hi = mid - 1;
    }
    return { line: lo + 1, column: offset - starts[lo]! + 1 };
  };
}

/** Nesting deeper than any recipe needs would overflow the parser's stack. */
function tooDeep(text: string): number | undefined {
  let depth = 0;
  let inString = false;
  for (let i = 0; i < text.length; i++) {
    const c = text.charCodeAt(i);
    if (inString) {
      if (c === 92) i++;
      else if (c === 34 || c === 10) inString = false;
    } else if (c === 34) inString = true;
    else if (c === 123 || c === 91) {
      if (++depth > MAX_DEPTH) return i;
    } else if (c === 125 || c === 93) depth--;
  }
  return undefined;
}

/**
 * Reads a recipe (JSON with comments and trailing commas). Shape and names are checked here; what the steps and files
 * say is checked by diagnose.ts. Never throws: problems come back with positions.
 */
export function parseRecipe(text: string): ParsedRecipe {
  const place = lineIndex(text);
  const diagnostics: Diagnostic[] = [];
  const report: ParsedRecipe['report'] = ({ from, to }, code, message, extra = {}) => {
    diagnostics.push({
      severity: 'error',
      code,
      message,
      from,
      to,
      ...place(from),
      suggestions: [],
      ...extra,
    });
  };
  const deep = tooDeep(text);
  const errors: ParseError[] = [];
  const root =
    deep === undefined
      ? parseTree(text, errors, { allowTrailingComma: true, disallowComments: false })
      : undefined;
  const span = (n: Node | undefined): { from: number; to: number } =>
    n ? { from: n.offset, to: n.offset + n.length } : { from: 0, to: Math.min(1, text.length) };
  const at: ParsedRecipe['at'] = (path) => {
    for (let cut = path.length; cut >= 0; cut--) {
      const node = root && findNodeAtLocation(root, path.slice(0, cut));
      if (node) return span(node);
    }
    return span(root);
  };
  if (deep !== undefined)
    report({ from: deep, to: deep + 1 }, 'json', `the document is nested more than ${MAX_DEPTH} levels deep`);
  for (const e of errors) {
    const what = printParseErrorCode(e.error)
      .replace(/([a-z])([A-Z])/g, '$1 $2')
      .toLowerCase();
    report({ from: e.offset, to: e.offset + Math.max(1, e.length) }, 'json', `not valid JSON: ${what}`);
  }
  if (!root || root.type !== 'object') {
    if (diagnostics.length === 0)
      report(span(root), 'json', 'a recipe is a JSON object with "fringe", "inputs" and "steps"');
    return { diagnostics, at, report };
  }

  const members = (node: Node | undefined): [string, Node, Node][] =>
    node?.type === 'object'
      ? (node.children ?? []).flatMap((p) => {
          const [key, value] = p.children ?? [];
          return key && value ? [[key.value as string, value, key] as [string, Node, Node]] : [];
        })
      : [];
  const unknownKeys = (node: Node, known: readonly string[], subject?: string): void => {
    for (const [key, , keyNode] of members(node)) {
      if (known.includes(key)) continue;
      const suggestions = nearestNames(key, known);
      report(span(keyNode), 'unknown-key', `unknown key "${key}".${hint(suggestions)}`, {
        suggestions,
        ...(subject === undefined ? {} : { subject }),
      });
    }
    const seen = new Set<string>();
    for (const [key, , keyNode] of members(node)) {
      if (seen.has(key)) report(span(keyNode), 'duplicate-key', `"${key}" is given twice`);
      seen.add(key);
    }
  };
  const get = (node: Node, key: string): Node | undefined => members(node).find(([k]) => k === key)?.[1];
  const need = (
    node: Node,
    key: string,
    type: 'string' | 'number' | 'array' | 'object',
    what: string,
  ): Node | undefined => {
    const child = get(node, key);
    if (!child)
      report({ from: node.offset, to: node.offset + 1 }, 'missing-key', `"${key}" is missing: ${what}`);
    else if (child.type !== type) {
      report(
        span(child),
        'wrong-type',
        `"${key}" must be ${type === 'object' ? 'an object' : type === 'array' ? 'a list' : `a ${type}`}: ${what}`,
      );
      return undefined;
    }
    return child;
  };

  unknownKeys(root, TOP_KEYS);
  const version = get(root, 'fringe');
  if (!version)
    report(
      { from: root.offset, to: root.offset + 1 },
      'missing-key',
      '"fringe": 1 is missing: the format version',
    );
  else if (version.value !== 1)
    report(
      span(version),
      'version',
      `format version ${String(version.value)} is not known to this program, which reads 1; use a newer Fringeside or set "fringe": 1`,
    );

  const inputs: Record<string, InputSpec> = {};
  for (const [name, node, key] of members(
    need(root, 'inputs', 'object', 'names for the channels the recipe reads'),
  )) {
    if (!NAME.test(name))
      report(
        span(key),
        'bad-name',
        `"${name}" cannot be an input's name: use letters, digits, - and _, beginning with a letter`,
      );
    if (node.type !== 'object') {
      report(span(node), 'wrong-type', `input "${name}" must be an object with "file"`);
      continue;
    }
    unknownKeys(node, INPUT_KEYS, name);
    need(node, 'file', 'string', 'path of the data file, relative to the recipe');
    const spec = getNodeValue(node) as InputSpec;
    const positive = (k: 'duration' | 'rate'): void => {
      const v = spec[k];
      if (v !== undefined && !(typeof v === 'number' && v > 0))
        report(span(get(node, k)), 'wrong-value', `"${k}" must be a number above 0`, { subject: name });
    };
    positive('duration');
    positive('rate');
    if (
      spec.scale !== undefined &&
      !(typeof spec.scale === 'number' && Number.isFinite(spec.scale) && spec.scale !== 0)
    )
      report(span(get(node, 'scale')), 'wrong-value', '"scale" must be a number other than 0', {
        subject: name,
      });
    for (const k of ['channel', 'unit'] as const)
      if (spec[k] !== undefined && typeof spec[k] !== 'string')
        report(span(get(node, k)), 'wrong-type', `"${k}" must be text`, { subject: name });
    for (const k of ['start', 'epoch'] as const) {
      const v = spec[k];
      if (
        v !== undefined &&
        !(typeof v === 'number'
          ? Number.isFinite(v)
          : typeof v === 'string' && /^\s*-?\d{1,12}(\.\d*)?\s*$/.test(v))
      )
        report(span(get(node, k)), 'wrong-value', `"${k}" must be a GPS time such as "1400000000.25"`, {
          subject: name,
        });
    }
    if (typeof spec.file === 'string') inputs[name] = spec;
  }

  const steps: StepSpec[] = [];
  const stepList = need(root, 'steps', 'array', 'what to do, in order');
  (stepList?.children ?? []).forEach((node, i) => {
    if (node.type !== 'object') {
      report(span(node), 'wrong-type', 'a step is an object with "id", "do" and "of"');
      return;
    }
    const idNode = need(node, 'id', 'string', 'a name of your choice for the step');
    const doNode = need(node, 'do', 'string', 'which operation it is');
    const id = idNode ? (idNode.value as string) : `step-${i + 1}`;
    if (idNode && !NAME.test(id))
      report(
        span(idNode),
        'bad-name',
        `"${id}" cannot be a step's id: use letters, digits, - and _, beginning with a letter`,
        { subject: id },
      );
    if (steps.some((s) => s.id === id) || Object.hasOwn(inputs, id))
      report(
        span(idNode ?? node),
        'duplicate-id',
        `the name "${id}" is used twice; ids of steps and names of inputs must differ`,
        { subject: id },
      );
    const seen = new Set<string>();
    for (const [key, , keyNode] of members(node)) {
      if (seen.has(key)) report(span(keyNode), 'duplicate-key', `"${key}" is given twice`, { subject: id });
      seen.add(key);
    }
    const ofNode = get(node, 'of');
    const of = ofNode ? (getNodeValue(ofNode) as unknown) : [];
    const names = typeof of === 'string' ? [of] : of;
    const isNames = Array.isArray(names) && names.every((n): n is string => typeof n === 'string');
    if (!isNames)
      report(span(ofNode), 'wrong-type', '"of" must be a list of names of inputs and earlier steps', {
        subject: id,
      });
    const off = get(node, 'off');
    if (off && off.type !== 'boolean')
      report(span(off), 'wrong-type', '"off" must be true or false', { subject: id });
    const params: Record<string, unknown> = {};
    for (const [key, value] of members(node))
      if (!(STEP_KEYS as readonly string[]).includes(key)) params[key] = getNodeValue(value);
    if (doNode)
      steps.push({
        id,
        do: doNode.value as string,
        of: isNames ? names : [],
        off: off?.value === true,
        params,
      });
  });

  const expect: Record<string, Expectation> = {};
  for (const [key, node] of members(get(root, 'expect'))) {
    if (node.type === 'object') unknownKeys(node, ['value', 'rel', 'abs']);
    const e = getNodeValue(node) as Partial<Expectation> | null;
    const isNumber = (v: unknown): boolean => v === undefined || (typeof v === 'number' && v >= 0);
    if (
      e === null ||
      typeof e !== 'object' ||
      typeof e.value !== 'number' ||
      !isNumber(e.rel) ||
      !isNumber(e.abs)
    )
      report(
        span(node),
        'wrong-type',
        `expectation "${key}" must be { "value": number, "rel": number or "abs": number }`,
      );
    else expect[key] = e as Expectation;
  }
  const text_ = (key: 'title' | 'sites'): string | undefined => {
    const node = get(root, key);
    if (node && node.type !== 'string') report(span(node), 'wrong-type', `"${key}" must be text`);
    return node?.type === 'string' ? (node.value as string) : undefined;
  };
  const title = text_('title');
  const sites = text_('sites');
  const recipe: Recipe = {
    fringe: 1,
    inputs,
    steps,
    ...(title === undefined ? {} : { title }),
    ...(sites === undefined ? {} : { sites }),
    ...(Object.keys(expect).length === 0 ? {} : { expect }),
  };
  // Text that jsonc-parser had to guess about must not run: the guess may drop half of a step.
  return errors.length > 0 ? { diagnostics, at, report } : { recipe, diagnostics, at, report };
}
