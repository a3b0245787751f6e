/** A number for captions and sentences: `digits` significant digits, trailing zeros dropped, exponent for very small and large. */
export function numberText(value: number, digits = 4): string {
  if (value === 0) return '0';
  if (!Number.isFinite(value)) return Number.isNaN(value) ? 'no value' : value > 0 ? '∞' : '−∞';
  const size = Math.abs(value);
  const text =
    size >= 1e-3 && size < 1e7
      ? String(Number(size >= 10 ** digits ? size.toFixed(0) : size.toPrecision(digits)))
      : size
          .toExponential(digits - 1)
          .replace(/\.?0+e/, 'e')
          .replace('e+', 'e');
  return value < 0 ? `−${text}` : text;
}

/** "1 gap", "2 gaps". */
export function counted(n: number, one: string, many = `${one}s`): string {
  return `${n} ${n === 1 ? one : many}`;
}

/** A value with its unit; a pure number has none. */
export function withUnit(value: number, unit: string, digits = 4): string {
  return unit === '' ? numberText(value, digits) : `${numberText(value, digits)} ${unit}`;
}

/** Notes of a series that every later card must repeat, as sentences after another; "" when there are none. */
export function repeated(notes: readonly string[] | undefined): string {
  return (notes ?? []).map((n) => ` Note: ${n}.`).join('');
}
