import type { AnyData, DataKind, DataKinds } from '../data/kinds';
import type { Port, StepInputs } from '../steps/define';

export interface NamedKind {
  readonly name: string;
  readonly kind: DataKind;
}

const KIND_WORDS: Record<DataKind, string> = {
  series: 'a series of samples',
  spectrum: 'a noise spectrum',
  overview: 'an overview',
  table: 'a table',
  lines: 'a list of lines',
  map: 'a time-frequency map',
  trend: 'a trend',
  statistic: 'a statistic against frequency',
  snr: 'a signal-to-noise series',
  consistency: 'a consistency check',
  waveform: 'a waveform',
  bank: 'a template bank',
  triggers: 'a list of triggers',
};

export const kindWords = (kind: DataKind): string => KIND_WORDS[kind];

/** Why names of these kinds do not fit a step's ports, or undefined when they do. */
export function portProblem(
  title: string,
  ports: readonly Port[],
  given: readonly NamedKind[],
): string | undefined {
  const left = [...given];
  const take = (kind: DataKind): NamedKind | undefined => {
    const at = left.findIndex((g) => g.kind === kind);
    return at < 0 ? undefined : left.splice(at, 1)[0];
  };
  for (const port of ports) {
    if (port.count === 'many') {
      let any = false;
      while (take(port.kind)) any = true;
      if (!any) return `${title} needs at least one of kind ${kindWords(port.kind)} in "of" (${port.help})`;
    } else if (!take(port.kind) && port.count === 'one') {
      return `${title} needs ${kindWords(port.kind)} in "of" (${port.help})`;
    }
  }
  const extra = left.at(0);
  return extra === undefined
    ? undefined
    : `${title} has no use for "${extra.name}", which is ${kindWords(extra.kind)}`;
}

/** The values behind a step's `of`, handed out by kind. */
export function bindInputs(names: readonly string[], values: readonly AnyData[]): StepInputs {
  const many = <K extends DataKind>(kind: K): DataKinds[K][] =>
    values.filter((v): v is DataKinds[K] => v.kind === kind);
  return {
    names,
    many,
    optional: (kind, nth = 0) => many(kind)[nth],
    one: (kind, nth = 0) => {
      const value = many(kind).at(nth);
      if (value === undefined)
        throw new Error(`no ${kind} number ${nth} among the inputs; ports were not checked`);
      return value;
    },
  };
}
