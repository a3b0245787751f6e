import { UserError } from '../data/errors';
import type { ParamValues, StepContext } from '../steps/define';
import { binaryOf } from './binary';
import { parseColumns } from './columns-text';
import { dampedSinusoid } from './damped-sinusoid';
import { fileWaveform } from './file-waveform';
import { inspiral } from './inspiral';
import { inspiralMergerRingdown } from './inspiral-merger-ringdown';
import type { SignalModel } from './signal-model';
import { sineGaussian } from './sine-gaussian';
import type { WAVEFORM_PARAMS } from './waveform-params';

export type WaveformParams = ParamValues<typeof WAVEFORM_PARAMS>;

/** What a sine-Gaussian is when nothing is said. */
const BURST = { frequency: 150, quality: 9, amplitude: 1e-22 } as const;

/** The signal that the parameters of the step ask for. */
export function modelOf(p: WaveformParams, context: Pick<StepContext, 'kernels' | 'readText'>): SignalModel {
  const phase = (p.phase * Math.PI) / 180;
  const { redshift, distance, low, high, taper } = p;
  switch (p.model) {
    case 'inspiral':
    case 'inspiral-merger-ringdown': {
      if (!(low > 0))
        throw new UserError(
          'low-zero',
          'a binary has no beginning: set "low" to the frequency in Hz from which the wave is wanted',
        );
      const spin = (s: number): number => (p.model === 'inspiral' ? s : 0);
      const binary = binaryOf(
        { mass: p['mass-1'], spin: spin(p['spin-1']) },
        { mass: p['mass-2'], spin: spin(p['spin-2']) },
        redshift,
      );
      const options = { binary, distance, low, high, taper, phase, redshift };
      return p.model === 'inspiral'
        ? inspiral({ ...options, order: p.order })
        : inspiralMergerRingdown(options);
    }
    case 'damped-sinusoid': {
      const { frequency, quality, amplitude, energy } = p;
      const given = frequency !== null && quality !== null;
      return dampedSinusoid({
        ...(given ? {} : { hole: { mass: p['remnant-mass'], spin: p['remnant-spin'] } }),
        frequency,
        quality,
        amplitude,
        energy,
        distance,
        phase,
        low,
        high,
      });
    }
    case 'sine-gaussian':
      return sineGaussian({
        frequency: p.frequency ?? BURST.frequency,
        quality: p.quality ?? BURST.quality,
        amplitude: p.amplitude ?? BURST.amplitude,
        phase,
        low: low > 0 ? low : null,
        high,
      });
    case 'file': {
      if (p.file === '')
        throw new UserError(
          'file-missing',
          'the model is "file": name the file in "file", relative to the recipe',
        );
      return fileWaveform(
        {
          file: parseColumns(context.readText(p.file), p.file),
          holds: p.holds,
          units: p.units,
          fileDistance: p['file-distance'],
          distance,
          totalMass: (p['mass-1'] + p['mass-2']) * (1 + redshift),
          low: low > 0 ? low : null,
          high,
          taper,
        },
        context.kernels,
      );
    }
  }
}
