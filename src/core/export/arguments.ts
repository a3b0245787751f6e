import type { DataKind } from '../data/kinds';
import type { GpsTime } from '../data/gps-time';
import type { Param, Port, ParamSpecs } from '../steps/define';
import { pyFloat, pyGps, pyInt, pyString } from './literal';

/** Endings of parameter names in Python by unit; other units are spelt in small letters. */
const SUFFIX: Readonly<Record<string, string>> = { '': '', s: '_s', Hz: '_hz' };

/** Name of a parameter in Python: the recipe's with its unit. */
export function pythonName(key: string, param: Param, known: readonly string[]): string {
  const plain = key.replaceAll('-', '_');
  const unit = 'unit' in param ? param.unit : '';
  const ending =
    param.kind === 'time' ? '_gps' : (SUFFIX[unit] ?? `_${unit.toLowerCase().replace(/\W+/g, '_')}`);
  const full = plain + ending;
  if (known.includes(full)) return full;
  if (known.includes(plain)) return plain;
  // A unit may be spelt otherwise, "_solar_masses" for "M☉".
  const near = known.filter((k) => k.startsWith(`${plain}_`));
  return near.length === 1 ? near[0] : full;
}

/** A parameter's value, as a step's `run` gets it, in Python. */
export function pythonValue(param: Param, value: unknown): string {
  if (value === null || value === undefined) return 'None';
  switch (param.kind) {
    case 'number':
      return param.integer === true ? pyInt(value as number) : pyFloat(value as number);
    case 'flag':
      return value === true ? 'True' : 'False';
    case 'time':
      return pyGps(value as GpsTime);
    case 'list': {
      const flat = (value as readonly number[]).map(pyFloat);
      if (param.each === 1) return `[${flat.join(', ')}]`;
      const groups: string[] = [];
      for (let i = 0; i < flat.length; i += param.each)
        groups.push(`(${flat.slice(i, i + param.each).join(', ')})`);
      return `[${groups.join(', ')}]`;
    }
    case 'file':
      return value === '' ? '""' : `str(FOLDER / ${pyString(value as string)})`;
    default:
      return pyString(value as string);
  }
}

/** Lines of a step's entry in PARAMS. */
export function paramLines(
  specs: ParamSpecs,
  values: Readonly<Record<string, unknown>>,
  keywords: readonly string[],
): string[] {
  return Object.entries(specs).map(
    ([key, p]) => `        "${pythonName(key, p, keywords)}": ${pythonValue(p, values[key])},`,
  );
}

/** What one value gives as positional arguments, by its kind. */
function passed(kind: DataKind, at: string | undefined): string[] {
  if (kind === 'series') return at === undefined ? ['None', 'None', 'None'] : [`*series(${at})`];
  if (kind === 'spectrum') return at === undefined ? ['None', 'None'] : [`*spectrum(${at})`];
  return [at ?? 'None'];
}

/** Positional arguments of a step: its inputs in the order of the ports. `many` ports give one list. */
export function positionalArguments(
  ports: readonly Port[],
  of: readonly { readonly at: string; readonly kind: DataKind }[],
  variadic: boolean,
): string[] {
  const left = [...of];
  const take = (kind: DataKind): string | undefined => {
    const k = left.findIndex((o) => o.kind === kind);
    return k < 0 ? undefined : left.splice(k, 1)[0].at;
  };
  return ports.flatMap((port) => {
    if (port.count !== 'many') {
      const at = take(port.kind);
      return at === undefined && variadic ? [] : passed(port.kind, at);
    }
    const all = left.filter((o) => o.kind === port.kind).map((o) => o.at);
    left.splice(0, left.length, ...left.filter((o) => o.kind !== port.kind));
    const each = all.map((at) =>
      port.kind === 'series' || port.kind === 'spectrum' ? `${port.kind}(${at})` : at,
    );
    return [`[${each.join(', ')}]`];
  });
}
