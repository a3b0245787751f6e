import { getNodeValue, type Node } from 'jsonc-parser';
import type { Diagnostic } from '../protocol/engine';
import { JsonTree } from './json-tree';
import { STEP_KEYS, type Expectation, type InputSpec, type Recipe, type StepSpec } from './recipe';

/** A recipe and the tree that knows where its parts stand. `recipe` is absent when the text is not whole JSON. */
export interface ParsedRecipe {
  readonly recipe?: Recipe;
  readonly tree: JsonTree;
  readonly diagnostics: readonly Diagnostic[];
}

const TOP_KEYS = ['$schema', 'fringe', 'title', 'sites', 'inputs', 'steps', 'expect'];
const INPUT_KEYS = ['file', 'channel', 'start', 'duration', 'rate', 'epoch', 'unit', 'scale'];
const NAME = /^[A-Za-z][A-Za-z0-9_-]*$/;
const NAME_RULE = 'use letters, digits, - and _, beginning with a letter';
const GPS_TEXT = /^\s*-?\d{1,12}(\.\d*)?\s*$/;

/**
 * Reads a recipe. Shape and names are checked here; what the steps and files say is checked by diagnose.ts.
 * Never throws: problems are in `diagnostics` with positions.
 */
export function parseRecipe(text: string): ParsedRecipe {
  const tree = new JsonTree(text);
  const { root } = tree;
  if (root?.type !== 'object') {
    if (tree.diagnostics.length === 0)
      tree.report(tree.range(root), 'json', 'a recipe is a JSON object with "fringe", "inputs" and "steps"');
    return { tree, diagnostics: tree.diagnostics };
  }
  tree.checkKeys(root, TOP_KEYS);
  checkVersion(tree, root);
  const inputs = parseInputs(tree, root);
  const steps = parseSteps(tree, root, Object.keys(inputs));
  const expect = parseExpect(tree, root);
  const title = textMember(tree, root, 'title');
  const sites = textMember(tree, root, 'sites');
  if (tree.broken) return { tree, diagnostics: tree.diagnostics };
  const recipe: Recipe = {
    fringe: 1,
    inputs,
    steps,
    ...(title === undefined ? {} : { title }),
    ...(sites === undefined ? {} : { sites }),
    ...(Object.keys(expect).length === 0 ? {} : { expect }),
  };
  return { recipe, tree, diagnostics: tree.diagnostics };
}

function checkVersion(tree: JsonTree, root: Node): void {
  const version = tree.get(root, 'fringe');
  const about = 'the format version, which this program reads as 1';
  if (!version)
    tree.report(
      { from: root.offset, to: root.offset + 1 },
      'missing-key',
      `"fringe": 1 is missing: ${about}`,
    );
  else if (version.value !== 1)
    tree.report(
      tree.range(version),
      'version',
      `"fringe" is ${String(version.value)}: ${about}. Use a newer Fringeside, or write 1 if the recipe is of this format`,
    );
}

function textMember(tree: JsonTree, root: Node, key: 'title' | 'sites'): string | undefined {
  const node = tree.get(root, key);
  if (node && node.type !== 'string') tree.report(tree.range(node), 'wrong-type', `"${key}" must be text`);
  return node?.type === 'string' ? (node.value as string) : undefined;
}

function parseInputs(tree: JsonTree, root: Node): Record<string, InputSpec> {
  const inputs: Record<string, InputSpec> = {};
  const list = tree.need(root, 'inputs', 'object', 'names for the channels the recipe reads');
  for (const { key: name, value: node, keyNode } of tree.members(list)) {
    if (!NAME.test(name))
      tree.report(tree.range(keyNode), 'bad-name', `"${name}" cannot be an input's name: ${NAME_RULE}`);
    if (node.type !== 'object') {
      tree.report(tree.range(node), 'wrong-type', `input "${name}" must be an object with "file"`);
      continue;
    }
    tree.checkKeys(node, INPUT_KEYS, name);
    const file = tree.need(node, 'file', 'string', 'path of the data file, relative to the recipe');
    checkInputValues(tree, node, name);
    if (file) inputs[name] = getNodeValue(node) as InputSpec;
  }
  return inputs;
}

function checkInputValues(tree: JsonTree, node: Node, name: string): void {
  const rules: readonly (readonly [key: string, ok: (v: unknown) => boolean, rule: string])[] = [
    ['duration', isPositive, 'a number of seconds above 0'],
    ['rate', isPositive, 'a number of Hz above 0'],
    ['scale', (v) => isFinite_(v) && v !== 0, 'a number other than 0'],
    ['channel', (v) => typeof v === 'string', 'text'],
    ['unit', (v) => typeof v === 'string', 'text'],
    ['start', isGps, 'a GPS time such as "1400000000.25"'],
    ['epoch', isGps, 'a GPS time such as "1400000000.25"'],
  ];
  for (const [key, ok, rule] of rules) {
    const member = tree.get(node, key);
    if (member && !ok(getNodeValue(member)))
      tree.report(tree.range(member), 'wrong-value', `"${key}" must be ${rule}`, { subject: name });
  }
}

const isFinite_ = (v: unknown): boolean => typeof v === 'number' && Number.isFinite(v);
const isPositive = (v: unknown): boolean => isFinite_(v) && (v as number) > 0;
const isGps = (v: unknown): boolean => isFinite_(v) || (typeof v === 'string' && GPS_TEXT.test(v));

function parseSteps(tree: JsonTree, root: Node, taken: readonly string[]): StepSpec[] {
  const names = new Set(taken);
  const list = tree.need(root, 'steps', 'array', 'what to do, in order');
  return (list?.children ?? []).flatMap((node, i) => {
    if (node.type !== 'object') {
      tree.report(tree.range(node), 'wrong-type', 'a step is an object with "id", "do" and "of"');
      return [];
    }
    const idNode = tree.need(node, 'id', 'string', 'a name of your choice for the step');
    const doNode = tree.need(node, 'do', 'string', 'which operation it is');
    const subject = idNode ? (idNode.value as string) : `step-${i + 1}`;
    if (!NAME.test(subject))
      tree.report(tree.range(idNode), 'bad-name', `"${subject}" cannot be a step's id: ${NAME_RULE}`, {
        subject,
      });
    if (names.has(subject))
      tree.report(
        tree.range(idNode ?? node),
        'duplicate-id',
        `the name "${subject}" is used twice; ids of steps and names of inputs must differ`,
        { subject },
      );
    names.add(subject);
    tree.checkKeys(node, undefined, subject);
    const off = tree.get(node, 'off');
    if (off && off.type !== 'boolean')
      tree.report(tree.range(off), 'wrong-type', '"off" must be true or false', { subject });
    const params: Record<string, unknown> = {};
    for (const { key, value } of tree.members(node)) {
      if (!(STEP_KEYS as readonly string[]).includes(key)) params[key] = getNodeValue(value);
    }
    if (!doNode) return [];
    return [
      {
        id: subject,
        do: doNode.value as string,
        of: parseOf(tree, node, subject),
        off: off?.value === true,
        params,
      },
    ];
  });
}

/** A single name may stand without brackets. */
function parseOf(tree: JsonTree, step: Node, subject: string): readonly string[] {
  const node = tree.get(step, 'of');
  if (!node) return [];
  const value = getNodeValue(node) as unknown;
  const names: unknown = typeof value === 'string' ? [value] : value;
  if (Array.isArray(names) && names.every((n): n is string => typeof n === 'string')) return names;
  tree.report(tree.range(node), 'wrong-type', '"of" must be a list of names of inputs and earlier steps', {
    subject,
  });
  return [];
}

function parseExpect(tree: JsonTree, root: Node): Record<string, Expectation> {
  const expect: Record<string, Expectation> = {};
  const tolerance = (v: unknown): boolean => v === undefined || (isFinite_(v) && (v as number) >= 0);
  for (const { key, value: node } of tree.members(tree.get(root, 'expect'))) {
    if (node.type === 'object') tree.checkKeys(node, ['value', 'rel', 'abs']);
    const e = getNodeValue(node) as Partial<Expectation> | null;
    if (e !== null && typeof e === 'object' && isFinite_(e.value) && tolerance(e.rel) && tolerance(e.abs))
      expect[key] = e as Expectation;
    else
      tree.report(
        tree.range(node),
        'wrong-type',
        `expectation "${key}" must be { "value": number, "rel": number or "abs": number }`,
      );
  }
  return expect;
}
