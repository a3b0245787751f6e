import { formatGps, type GpsTime } from '../data/gps-time';

/** Invisible and direction-changing characters, which must be seen in a script, not act in it. */

const UNSEEN =
  /[\u0000-\u001f\u007f-\u00a0\u00ad\u061c\u200b-\u200f\u2028-\u202f\u2060-\u206f\ufeff\ufff0-\uffff]/g;

const escaped = (c: string): string => `\\u${c.charCodeAt(0).toString(16).padStart(4, '0')}`;

/** A Python string literal for any text. JSON's escapes are Python's too; lone surrogates stay escaped. */
export function pyString(text: string): string {
  return JSON.stringify(text).replace(UNSEEN, escaped);
}

/** Text for the inside of a comment: one line, nothing unseen, not too long. */
export function pyComment(text: string): string {
  const line = text
    .replace(/\p{Surrogate}/gu, '\ufffd')
    .replace(/\s+/g, ' ')
    .replace(UNSEEN, escaped)
    .trim();
  return line.length > 300 ? `${line.slice(0, 300)}…` : line;
}

/** A float, always with a point or an exponent so that Python does not take it for an integer. */
export function pyFloat(value: number): string {
  if (Number.isNaN(value)) return 'math.nan';
  if (!Number.isFinite(value)) return value > 0 ? 'math.inf' : '-math.inf';
  const text = Object.is(value, -0) ? '-0.0' : String(value);
  return /[.e]/.test(text) ? text : `${text}.0`;
}

export const pyInt = (value: number): string => String(value);

/** GPS seconds as the nearest float64; the exact decimal text is what Python rounds. */
export const pyGps = (time: GpsTime): string => pyFloat(Number(formatGps(time)));
