import type { DataKind } from '../data/kinds';
import type { Card } from '../protocol/engine';
import type { Recipe } from '../recipe/recipe';
import type { PreparedInput } from '../recipe/inputs';
import { frame, readers, shared, stepSources } from '../python';
import type { AnyStep } from '../steps/define';
import { paramLines, positionalArguments } from './arguments';
import { exportedInput, type ExportedInput } from './input-facts';
import { pyComment, pyFloat, pyString } from './literal';
import { calledShared, pythonSource, usualTolerance, type PythonSource } from './source';

export interface ScriptRequest {
  readonly recipe: Recipe;
  readonly version: string;
  /** In the order in which they ran. */
  readonly cards: readonly Card[];
  readonly inputs: ReadonlyMap<string, PreparedInput>;
  readonly registry: Readonly<Record<string, AnyStep>>;
  /** The recipe's folder as seen from the script's. */
  readonly dataFolder: string;
}

/** A step that the script leaves out, and why. */
export interface LeftOut {
  readonly id: string;
  readonly do: string;
  readonly why: string;
  /** The step itself did not finish. */
  readonly failed: boolean;
}

export interface Script {
  readonly text: string;
  readonly leftOut: readonly LeftOut[];
  /** Ids of the steps that the script computes. */
  readonly steps: readonly string[];
}

interface Chosen {
  readonly card: Card;
  readonly step: AnyStep;
  readonly source: PythonSource;
}

/** One script from a finished run: same recipe, same data, same text. */
export function pythonScript(request: ScriptRequest): Script {
  const { chosen, leftOut } = choose(request);
  const used = new Set(chosen.flatMap((c) => c.card.of));
  const inputs = [...request.inputs].filter(([name]) => used.has(name));
  const entries = inputs.map(([name, input]) => [name, exportedInput(name, input)] as const);
  const sources = [...new Map(chosen.map((c) => [c.source.function, c.source])).values()];
  const helperNames = calledShared(sources.map((s) => s.body).join('\n'), shared);
  const helpers = helperNames.map((n) => pythonSource(shared[n], n));
  const readerNames = [...new Set(entries.map(([, e]) => e.reader))].sort();
  const readerParts = readerNames.map((n) => plain(readers[n]));
  const [inputFrame, agreementFrame] = [plain(frame['inputs']), plain(frame['agreement'])];
  const parts = [...sources, ...helpers, ...readerParts, inputFrame, agreementFrame];
  const imports = [...new Set(['import math', ...parts.flatMap((p) => p.imports)])].sort(importOrder);
  const hdf5 = imports.some((l) => /\bh5py\b/.test(l));
  const text = [
    header(request, hdf5, leftOut),
    `# %% Imports\n${imports.join('\n')}`,
    `# %% Where the data are: the first argument, or the folder of the recipe\n` +
      `FOLDER = Path(sys.argv[1]) if len(sys.argv) > 1 and Path(sys.argv[1]).is_dir() else Path(globals().get("__file__", "")).resolve().parent / ${pyString(request.dataFolder)}`,
    `# %% Inputs as Fringeside found them\nINPUTS = {\n${entries.map(([n, e]) => `    ${pyString(n)}: {\n${e.lines.join('\n')}\n    },`).join('\n')}\n}`,
    `# %% Parameters of the steps, units in their names. Other values give other numbers than those at the end.\nPARAMS = {\n${chosen.map(paramsEntry).join('\n')}\n}`,
    `# %% Reading\n${[inputFrame, ...readerParts].map((p) => p.body).join('\n\n\n')}`,
    ...helpers.map((h) => `# %% Used by several steps\n${h.body}`),
    ...sources.map((s) => `# %% Step ${s.function.replaceAll('_', '-')}\n${s.body}`),
    `# %% All steps in order\n${mainFunction(request, chosen, entries)}`,
    expected(chosen),
    `# %% Agreement\n${agreementFrame.body}`,
    `if __name__ == "__main__":\n    sys.exit(report(main(PARAMS), EXPECTED, NOT_COMPARED))`,
  ].join('\n\n\n');
  return { text: `${text}\n`, leftOut, steps: chosen.map((c) => c.card.id) };
}

function choose({ cards, registry }: ScriptRequest): { chosen: Chosen[]; leftOut: LeftOut[] } {
  const chosen: Chosen[] = [];
  const leftOut: LeftOut[] = [];
  for (const card of cards) {
    const leave = (why: string): void =>
      void leftOut.push({
        id: card.id,
        do: card.do,
        why,
        failed: card.state === 'failed' || card.state === 'blocked',
      });
    const missing = card.of.find((name) => leftOut.some((l) => l.id === name));
    if (card.state !== 'done') leave(card.error?.message ?? `the step is ${card.state}`);
    else if (missing !== undefined) leave(`it needs "${missing}", which is left out`);
    else if (!Object.hasOwn(stepSources, card.do)) leave(`no faithful equivalent of ${card.do} in Python`);
    else chosen.push({ card, step: registry[card.do], source: pythonSource(stepSources[card.do], card.do) });
  }
  return { chosen, leftOut };
}

/** A file of several functions, none of them a step's. */
function plain(text: string): { readonly imports: readonly string[]; readonly body: string } {
  const lines = text.split('\n');
  const isImport = (l: string): boolean => /^(import|from) /.test(l);
  return {
    imports: lines.filter(isImport),
    body: lines
      .filter((l) => !isImport(l))
      .join('\n')
      .trim(),
  };
}

/** Standard library first, then packages. */
function importOrder(a: string, b: string): number {
  const rank = (l: string): number => (/\b(numpy|scipy|h5py)\b/.test(l) ? 1 : 0);
  return rank(a) - rank(b) || (a < b ? -1 : 1);
}

function header({ recipe, version }: ScriptRequest, hdf5: boolean, leftOut: readonly LeftOut[]): string {
  const packages = ['numpy>=1.24', 'scipy>=1.10', ...(hdf5 ? ['h5py'] : [])];
  return [
    '# /// script',
    '# requires-python = ">=3.10"',
    `# dependencies = [${packages.map((p) => `"${p}"`).join(', ')}]`,
    '# ///',
    `# Title: ${recipe.title === undefined ? 'none' : pyComment(recipe.title)}`,
    `# Written by Fringeside ${version} from a recipe: the same numbers with NumPy and SciPy alone.`,
    '# It reads the data files, checks that their samples are the ones Fringeside read, computes every step, prints JSON',
    '# and compares with the numbers of Fringeside: exit code 0 when all agree, 1 when not or when the data differ.',
    ...leftOut.map((l) => `# Left out: ${pyComment(`step "${l.id}" (${l.do}): ${l.why}`)}`),
  ].join('\n');
}

function paramsEntry({ card, step, source }: Chosen): string {
  const lines = paramLines(step.params, card.provenance?.params ?? {}, source.keywords);
  return lines.length === 0
    ? `    ${pyString(card.id)}: {},`
    : `    ${pyString(card.id)}: {\n${lines.join('\n')}\n    },`;
}

function mainFunction(
  { inputs, registry }: ScriptRequest,
  chosen: readonly Chosen[],
  entries: readonly (readonly [string, ExportedInput])[],
): string {
  const kindOf = (name: string): DataKind => {
    const card = chosen.find((c) => c.card.id === name)?.card;
    return card ? registry[card.do].gives : 'series';
  };
  const place = (name: string): string => `out[${pyString(name)}]`;
  const calls = chosen.map(({ card, step, source }) => {
    const given = card.of.map((name) => ({ at: place(name), kind: kindOf(name) }));
    const spectra = given.filter((g) => g.kind === 'spectrum').map((g) => g.at);
    const args = [
      ...positionalArguments(step.takes, given, source.variadic),
      ...(source.keywords.includes('spectra') ? [`spectra=[${spectra.join(', ')}]`] : []),
      `**params[${pyString(card.id)}]`,
    ];
    return `    ${place(card.id)} = ${source.function}(${args.join(', ')})`;
  });
  return [
    'def main(params):',
    '    """Reads the inputs and runs the steps; returns input series and results by name, each result with its "numbers"."""',
    '    out = {}',
    ...entries
      .filter(([name]) => inputs.has(name))
      .map(
        ([name, e]) =>
          `    ${place(name)} = read_input(${pyString(name)}, INPUTS[${pyString(name)}], read_${e.reader})`,
      ),
    ...calls,
    '    return out',
  ].join('\n');
}

/** Fringeside's numbers with their tolerances, and those that the equivalents do not state. */
function expected(chosen: readonly Chosen[]): string {
  const lines: string[] = [];
  const not: string[] = [];
  for (const { card, source } of chosen) {
    const body = card.numbers.flatMap((q) => {
      const why = source.notComputed.get(q.id);
      if (why !== undefined) {
        not.push(`    ${pyString(`${card.id}.${q.id}: ${why}`)},`);
        return [];
      }
      const t = source.tolerances.get(q.id) ?? usualTolerance(q.unit);
      const note = t.why === '' ? '' : `  # ${pyComment(t.why)}`;
      return [
        `        ${pyString(q.id)}: (${pyFloat(q.value)}, ${pyString(q.unit)}, ${pyFloat(t.rel)}, ${pyFloat(t.abs)}),${note}`,
      ];
    });
    lines.push(`    ${pyString(card.id)}: {`, ...body, '    },');
  }
  return (
    `# %% Numbers that Fringeside found: value, unit, relative and absolute tolerance\nEXPECTED = {\n${lines.join('\n')}\n}\n` +
    `# Numbers that are not computed here, and why\nNOT_COMPARED = [${not.length === 0 ? '' : `\n${not.join('\n')}\n`}]`
  );
}
