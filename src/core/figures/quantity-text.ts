import type { Quantity } from '../data/quantity';
import { digitsFor, numberText } from './shown-number';

/** Texts of a quantity: value with unit, interval with its meaning, and what the copy button puts on the clipboard. */
export interface QuantityText {
  readonly value: string;
  readonly unit: string;
  readonly interval?: string;
  /** Full precision, plain ASCII, with unit. */
  readonly copy: string;
}

export function quantityText(q: Quantity): QuantityText {
  const digits = digitsFor(q.value, q.low, q.high);
  const interval = intervalText(q, digits);
  return {
    value: numberText(q.value, digits),
    unit: q.unit,
    ...(interval === undefined ? {} : { interval }),
    copy: q.unit === '' ? String(q.value) : `${q.value} ${q.unit}`,
  };
}

function intervalText({ low, high, intervalMeaning }: Quantity, digits: number): string | undefined {
  if (low === undefined && high === undefined) return undefined;
  const range =
    low === undefined
      ? `below ${numberText(high!, digits)}`
      : high === undefined
        ? `above ${numberText(low, digits)}`
        : `${numberText(low, digits)} to ${numberText(high, digits)}`;
  return intervalMeaning === undefined ? range : `${range} (${intervalMeaning})`;
}
