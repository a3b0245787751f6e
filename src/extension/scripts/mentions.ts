import { DATA_ENDINGS } from '../data-endings';

/** Something in a script's text that an analyst may want to look at. */
export interface Mention {
  readonly kind: 'file' | 'gps';
  /** The path as written, or the GPS seconds without digit separators. */
  readonly text: string;
  /** Columns of the line, half-open. */
  readonly from: number;
  readonly to: number;
}

const ENDING = `(?:${DATA_ENDINGS.join('|')})`;
const QUOTED = new RegExp(String.raw`(["'\`])([^"'\`\n]*\.${ENDING})\1`, 'gi');
const BARE = new RegExp(String.raw`(?<![\w/.~-])[\w/.~-][\w/.~+=-]*\.${ENDING}(?![\w-])`, 'gi');
const NUMBER = /(?<![\w.+\-"'/])(\d{9,10}|\d{1,4}(?:_\d{3}){2,3})(\.\d{1,9})?(?![\w.]|\d)/g;
/** From 1989 to 2059: other numbers of this length are rarely times. */
const EARLIEST = 3e8;
const LATEST = 2.5e9;

/** Paths of data files and numbers that can be GPS seconds in one line of text, in their order. */
export function mentionsIn(line: string): Mention[] {
  const found: Mention[] = [];
  const free = (from: number, to: number): boolean => found.every((m) => to <= m.from || from >= m.to);
  for (const m of line.matchAll(QUOTED)) {
    const from = m.index + 1;
    found.push({ kind: 'file', text: m[2], from, to: from + m[2].length });
  }
  for (const m of line.matchAll(BARE)) {
    const to = m.index + m[0].length;
    if (free(m.index, to)) found.push({ kind: 'file', text: m[0], from: m.index, to });
  }
  for (const m of line.matchAll(NUMBER)) {
    const text = m[0].replaceAll('_', '');
    const value = Number(text);
    const to = m.index + m[0].length;
    if (value >= EARLIEST && value < LATEST && free(m.index, to))
      found.push({ kind: 'gps', text, from: m.index, to });
  }
  return found.sort((a, b) => a.from - b.from);
}

export const mentionAt = (line: string, column: number): Mention | undefined =>
  mentionsIn(line).find((m) => column >= m.from && column <= m.to);
