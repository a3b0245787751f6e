const SUPERSCRIPT: Readonly<Record<string, string>> = {
  '-': '⁻',
  '0': '⁰',
  '1': '¹',
  '2': '²',
  '3': '³',
  '4': '⁴',
  '5': '⁵',
  '6': '⁶',
  '7': '⁷',
  '8': '⁸',
  '9': '⁹',
};

/** Digits shown of a number that comes without an interval. */
const USUAL_DIGITS = 4;

/**
 * A number as text with `digits` significant digits: plain between 0.001 and a million, else with a power of ten
 * ("1.23 × 10⁻²³"). Whole numbers up to a billion are written out in full, in groups of three.
 */
export function numberText(value: number, digits = USUAL_DIGITS): string {
  if (Number.isNaN(value)) return 'not a number';
  if (!Number.isFinite(value)) return value > 0 ? '∞' : '−∞';
  if (value === 0) return '0';
  const size = Math.abs(value);
  if (Number.isInteger(value) && size < 1e9) return grouped(value);
  if (size >= 1e-3 && size < 1e6) return signed(trimmed(size.toPrecision(digits)), value);
  const [mantissa = '', exponent = ''] = size.toExponential(digits - 1).split('e');
  return signed(`${trimmed(mantissa)} × 10${superscript(exponent.replace('+', ''))}`, value);
}

/** Significant digits that an interval leaves meaningful: down to the second digit of its half width. */
export function digitsFor(value: number, low: number | undefined, high: number | undefined): number {
  if (low === undefined || high === undefined || !(high > low) || value === 0) return USUAL_DIGITS;
  const place = (v: number): number => Math.floor(Math.log10(v));
  const digits = place(Math.abs(value)) - place((high - low) / 2) + 2;
  return Number.isFinite(digits) ? Math.max(2, Math.min(10, digits)) : USUAL_DIGITS;
}

/** Bytes as people read them. */
export function bytesText(size: number): string {
  const units = ['bytes', 'kB', 'MB', 'GB', 'TB'];
  let at = 0;
  let v = size;
  while (v >= 1000 && at < units.length - 1) {
    v /= 1000;
    at += 1;
  }
  return `${at === 0 ? grouped(v) : numberText(Number(v.toPrecision(3)), 3)} ${units[at] ?? ''}`;
}

/** A length of time in seconds, with a coarser unit beside it when it is long. */
export function secondsText(seconds: number): string {
  const exact = `${numberText(seconds, 7)} s`;
  if (seconds < 120) return exact;
  if (seconds < 7200) return `${exact} (${numberText(seconds / 60, 3)} min)`;
  return seconds < 172_800
    ? `${exact} (${numberText(seconds / 3600, 3)} h)`
    : `${exact} (${numberText(seconds / 86_400, 3)} d)`;
}

function superscript(text: string): string {
  return text.replace(/./g, (c) => SUPERSCRIPT[c] ?? c);
}

function signed(text: string, value: number): string {
  return value < 0 ? `−${text}` : text;
}

function trimmed(text: string): string {
  // toPrecision falls back to exponents when it has fewer digits than the number has places.
  const plain = text.includes('e') ? String(Number(text)) : text;
  return plain.includes('.') ? plain.replace(/\.?0+$/, '') : plain;
}

function grouped(value: number): string {
  const digits = String(Math.abs(value));
  const text = digits.length > 4 ? digits.replace(/\B(?=(\d{3})+$)/g, '\u202f') : digits;
  return signed(text, value);
}
