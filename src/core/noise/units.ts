const simple = (unit: string): string => (/[\s/*·]/.test(unit) ? `(${unit})` : unit);

/** Unit of a power spectral density of samples in `unit`: "strain²/Hz", "(m/s)²/Hz", and "1/Hz" for a pure number. */
export function densityUnit(unit: string): string {
  return unit === '' || unit === '1' ? '1/Hz' : `${simple(unit)}²/Hz`;
}

/** Unit of the square root of a density: "strain/√Hz" for "strain²/Hz". */
export function amplitudeUnit(density: string): string {
  if (density === '1/Hz') return '1/√Hz';
  const m = /^(.*)²\/Hz$/.exec(density);
  return m ? `${m[1]}/√Hz` : `√(${density})`;
}

/** Unit of the samples behind a density: "strain" for "strain²/Hz". */
export function sampleUnit(density: string): string {
  const m = /^\(?(.*?)\)?²\/Hz$/.exec(density);
  return m ? m[1] : '';
}
