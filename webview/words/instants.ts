import { addSeconds, formatGps, parseGps, secondsBetween, utcText } from '../../src/core/data/gps-time';

/** GPS and UTC of `seconds` after `epoch`, rounded to what a picture can resolve. */
export function instantAfter(epoch: string, seconds: number, decimals = 6): { gps: string; utc: string } {
  const t = addSeconds(parseGps(epoch), Number(seconds.toFixed(decimals)));
  return { gps: formatGps(t), utc: utcText(t) };
}

/** UTC of a GPS time as text, or a dash when the text is not one. */
export function utcOf(gps: string): string {
  try {
    return utcText(parseGps(gps));
  } catch {
    return '–';
  }
}

/** Seconds by which the zero of `from` lies after the zero of `to`; exact. */
export function epochShift(from: string, to: string): number {
  return secondsBetween(parseGps(from), parseGps(to));
}
