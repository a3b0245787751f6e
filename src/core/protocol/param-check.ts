import { parseGps, type GpsTime } from '../data/gps-time';
import type { Param } from '../steps/define';

export type ParamCheck =
  { readonly ok: true; readonly value: unknown } | { readonly ok: false; readonly message: string };

const good = (value: unknown): ParamCheck => ({ ok: true, value });
const bad = (message: string): ParamCheck => ({ ok: false, message });

function inBounds(
  v: number,
  p: { min?: number; max?: number; exclusiveMin?: boolean; unit: string },
): string | undefined {
  const unit = p.unit === '' ? '' : ` ${p.unit}`;
  if (!Number.isFinite(v)) return 'must be a finite number';
  if (p.min !== undefined && (p.exclusiveMin === true ? v <= p.min : v < p.min))
    return `must be ${p.exclusiveMin === true ? 'more than' : 'at least'} ${p.min}${unit}, not ${v}`;
  if (p.max !== undefined && v > p.max) return `must be at most ${p.max}${unit}, not ${v}`;
  return undefined;
}

/**
 * Checks one parameter's raw value from a recipe or a form. On success gives the value a step's `run` gets (a GPS time
 * for `time`), on failure a phrase that continues "segment …".
 */
export function checkParam(p: Param, raw: unknown): ParamCheck {
  switch (p.kind) {
    case 'number': {
      if (raw === null && p.default === null) return good(null);
      if (typeof raw !== 'number') return bad(`must be a number${p.unit === '' ? '' : ` in ${p.unit}`}`);
      if (p.integer === true && !Number.isInteger(raw)) return bad(`must be a whole number, not ${raw}`);
      const problem = inBounds(raw, p);
      return problem === undefined ? good(raw) : bad(problem);
    }
    case 'choice':
      return typeof raw === 'string' && p.choices.includes(raw)
        ? good(raw)
        : bad(`must be one of ${p.choices.map((c) => `"${c}"`).join(', ')}`);
    case 'flag':
      return typeof raw === 'boolean' ? good(raw) : bad('must be true or false');
    case 'text':
    case 'file':
      return typeof raw === 'string' ? good(raw) : bad('must be text in quotes');
    case 'time': {
      if (raw === null) return good(null);
      if (typeof raw !== 'string' && typeof raw !== 'number') return bad('must be a GPS time');
      try {
        const t: GpsTime = parseGps(raw);
        return good(t);
      } catch (e) {
        return bad(e instanceof Error ? `must be a GPS time: ${e.message}` : 'must be a GPS time');
      }
    }
    case 'list': {
      if (!Array.isArray(raw)) return bad(`must be a list of numbers${p.unit === '' ? '' : ` in ${p.unit}`}`);
      const flat = raw.flat() as unknown[];
      if (flat.length % p.each !== 0)
        return bad(`needs ${p.each} numbers for each entry, has ${flat.length} in all`);
      for (const v of flat) {
        if (typeof v !== 'number') return bad('must hold numbers only');
        const problem = inBounds(v, p);
        if (problem !== undefined) return bad(`has an entry that ${problem}`);
      }
      return good(flat);
    }
  }
}

/** The value a parameter has when the recipe does not name it. */
export function defaultOf(p: Param): unknown {
  return p.default;
}
