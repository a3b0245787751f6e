/** What an exported script must know of one of the `.py` files. */
export interface PythonSource {
  readonly imports: readonly string[];
  /** The file without its imports and directives. */
  readonly body: string;
  readonly function: string;
  readonly positional: readonly string[];
  /** Whether an optional input may be left out (`*spectrum`), else None stands for it. */
  readonly variadic: boolean;
  readonly keywords: readonly string[];
  readonly tolerances: ReadonlyMap<string, Tolerance>;
  /** Quantities of the step that it does not state, and why. */
  readonly notComputed: ReadonlyMap<string, string>;
}

export interface Tolerance {
  readonly rel: number;
  readonly abs: number;
  /** Why it is not the usual one. */
  readonly why: string;
}

/** Agreement asked of a quantity without one of its own: sums in another order differ by 1e-11 or less. */
const USUAL: Tolerance = { rel: 1e-9, abs: 0, why: '' };
/** A level of nearly 0 dB is no small quantity. */
const LEVEL: Tolerance = { rel: 1e-9, abs: 1e-9, why: 'a logarithm' };

export const usualTolerance = (unit: string): Tolerance => (unit === 'dB' ? LEVEL : USUAL);

/**
 * Takes a `.py` file apart: imports at the top; lines `# tolerance ID: rel 1e-4, because …` (or `abs`) and
 * `# not computed ID: because …` for quantities of the step; one function named like the file. Throws when there is no such function: the file is wrong, not the user.
 */
export function pythonSource(text: string, name: string): PythonSource {
  const imports: string[] = [];
  const tolerances = new Map<string, Tolerance>();
  const notComputed = new Map<string, string>();
  const rest: string[] = [];
  for (const line of text.split('\n')) {
    const tolerance = /^# tolerance ([\w-]+): (rel|abs) (\S+?),? +(.+)$/.exec(line);
    if (tolerance) {
      const [, id, kind, value, why] = tolerance;
      const old = tolerances.get(id) ?? { rel: 0, abs: 0, why };
      tolerances.set(id, { ...old, [kind]: Number(value) });
    } else if (line.startsWith('# not computed ')) {
      const [id, why] = line.slice(15).split(/: (.*)/s);
      notComputed.set(id, why);
    } else if (/^(import|from) /.test(line)) imports.push(line);
    else rest.push(line);
  }
  const wanted = name.replaceAll('-', '_');
  const def = new RegExp(`^def ${wanted}\\(([\\s\\S]*?)\\):`, 'm').exec(text);
  if (!def) throw new Error(`python/${name}.py has no function ${wanted}`);
  const parts = def[1]
    .split(',')
    .map((p) => p.trim())
    .filter((p) => p !== '');
  const star = parts.findIndex((p) => p.startsWith('*'));
  return {
    imports,
    body: rest.join('\n').trim(),
    function: wanted,
    positional: star < 0 ? parts : parts.slice(0, star),
    variadic: star >= 0 && parts[star] !== '*',
    keywords: star < 0 ? [] : parts.slice(star + 1),
    tolerances,
    notComputed,
  };
}

/** The shared functions that a source calls, and those that they call, in the order of their names. */
export function calledShared(body: string, shared: Readonly<Record<string, string>>): string[] {
  const found = new Set<string>();
  const visit = (text: string): void => {
    for (const [name, source] of Object.entries(shared)) {
      if (found.has(name) || !new RegExp(`(?<![\\w.])${name}(?!\\w)`).test(text)) continue;
      found.add(name);
      visit(source);
    }
  };
  visit(body);
  return [...found].sort();
}
