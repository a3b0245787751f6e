import {
  applyEdits,
  modify,
  parseTree,
  findNodeAtLocation,
  getNodeValue,
  type FormattingOptions,
  type JSONPath,
} from 'jsonc-parser';

/** A change a card asks for. Values of undefined remove the key. */
export type RecipeEdit =
  | { readonly op: 'set'; readonly step: string; readonly params: Readonly<Record<string, unknown>> }
  | { readonly op: 'add'; readonly step: NewStep; readonly at?: number }
  | { readonly op: 'remove'; readonly step: string }
  | { readonly op: 'duplicate'; readonly step: string }
  | { readonly op: 'move'; readonly step: string; readonly to: number }
  | { readonly op: 'off'; readonly step: string; readonly off: boolean }
  | { readonly op: 'input'; readonly input: string; readonly values: Readonly<Record<string, unknown>> };

export interface NewStep {
  readonly id?: string;
  readonly do: string;
  readonly of: readonly string[];
  readonly params?: Readonly<Record<string, unknown>>;
}

export interface TextChange {
  readonly offset: number;
  readonly length: number;
  readonly content: string;
}

const FORMAT: FormattingOptions = { insertSpaces: true, tabSize: 2 };

/**
 * Smallest changes of the recipe's text that carry out `edit`; comments and layout elsewhere stay. Throws a RangeError
 * when the step or input is not there (the document changed meanwhile).
 */
export function editRecipe(text: string, edit: RecipeEdit): TextChange[] {
  const ids = stepIds(text);
  const index = (step: string): number => {
    const i = ids.indexOf(step);
    if (i < 0) throw new RangeError(`the recipe has no step "${step}" any more`);
    return i;
  };
  switch (edit.op) {
    case 'set':
      return each(
        text,
        Object.entries(edit.params).map(([k, v]) => [['steps', index(edit.step), k], v]),
      );
    case 'off':
      return each(text, [[['steps', index(edit.step), 'off'], edit.off ? true : undefined]]);
    case 'input':
      return each(
        text,
        Object.entries(edit.values).map(([k, v]) => [['inputs', edit.input, k], v]),
      );
    case 'add':
      return insert(text, stepObject(edit.step, ids), edit.at ?? ids.length);
    case 'remove':
      return each(text, [[['steps', index(edit.step)], undefined]]);
    case 'duplicate': {
      const i = index(edit.step);
      const copy = valueAt(text, ['steps', i]) as Record<string, unknown>;
      return insert(text, { ...copy, id: freshId(edit.step, ids) }, i + 1);
    }
    case 'move': {
      const i = index(edit.step);
      const moved = valueAt(text, ['steps', i]);
      const without = applyEdits(text, modify(text, ['steps', i], undefined, { formattingOptions: FORMAT }));
      const to = Math.max(0, Math.min(edit.to, ids.length - 1));
      const after = applyEdits(without, insert(without, moved, to));
      return [difference(text, after)];
    }
  }
}

/** An id not yet used, made from a base: noise, noise-2, noise-3 … */
export function freshId(base: string, taken: readonly string[]): string {
  const stem = base.replace(/-\d+$/, '');
  if (!taken.includes(stem)) return stem;
  for (let n = 2; ; n++) if (!taken.includes(`${stem}-${n}`)) return `${stem}-${n}`;
}

function stepObject(step: NewStep, taken: readonly string[]): Record<string, unknown> {
  return { id: step.id ?? freshId(step.do, taken), do: step.do, of: step.of, ...step.params };
}

function stepIds(text: string): string[] {
  const steps = valueAt(text, ['steps']);
  return Array.isArray(steps) ? steps.map((s: unknown) => (s as { id?: string } | null)?.id ?? '') : [];
}

function valueAt(text: string, path: JSONPath): unknown {
  const root = parseTree(text, [], { allowTrailingComma: true });
  const node = root && findNodeAtLocation(root, path);
  return node && (getNodeValue(node) as unknown);
}

function insert(text: string, value: unknown, at: number): TextChange[] {
  return modify(text, ['steps', at], value, { formattingOptions: FORMAT, isArrayInsertion: true });
}

/** Several changes one after the other, given back as one that leads from the first text to the last. */
function each(text: string, changes: readonly (readonly [JSONPath, unknown])[]): TextChange[] {
  if (changes.length === 1) return modify(text, changes[0][0], changes[0][1], { formattingOptions: FORMAT });
  let now = text;
  for (const [path, value] of changes)
    now = applyEdits(now, modify(now, path, value, { formattingOptions: FORMAT }));
  return now === text ? [] : [difference(text, now)];
}

function difference(before: string, after: string): TextChange {
  let head = 0;
  while (head < before.length && head < after.length && before[head] === after[head]) head++;
  let tail = 0;
  while (
    tail < before.length - head &&
    tail < after.length - head &&
    before.at(-1 - tail) === after.at(-1 - tail)
  )
    tail++;
  return {
    offset: head,
    length: before.length - head - tail,
    content: after.slice(head, after.length - tail),
  };
}
