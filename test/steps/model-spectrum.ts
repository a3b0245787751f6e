import type { Spectrum } from '../../src/core/data/kinds';
import { NOISE_MODELS } from '../../src/core/noise/models';

/** A published model as a curve on even bins. */
export function modelSpectrum(id: string, df = 0.25, top = 2048): Spectrum {
  const model = NOISE_MODELS.find((m) => m.id === id)!;
  const frequency = Float64Array.from({ length: top / df }, (_, k) => (k + 1) * df);
  return {
    kind: 'spectrum',
    label: id,
    frequency,
    density: frequency.map(model.density),
    df,
    unit: 'strain²/Hz',
  };
}
