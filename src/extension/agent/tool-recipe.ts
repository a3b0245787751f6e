/** What an agent may ask of a data file. */
export interface DataRequest {
  readonly file: string;
  readonly channel?: string;
  readonly start?: string;
  readonly duration?: number;
  readonly rate?: number;
  readonly segment?: number;
  readonly mass1?: number;
  readonly mass2?: number;
}

export type DataTool = 'overview' | 'noise' | 'map' | 'match';

/** The recipe that answers a request; the same engine runs it as any other. */
export function toolRecipe(tool: DataTool, request: DataRequest): string {
  const { file, channel, start, duration, rate, segment, mass1, mass2 } = request;
  const input = { file, channel, start, duration, rate };
  const noise = { id: 'noise', do: 'noise-spectrum', of: ['data'], segment };
  const steps: Readonly<Record<DataTool, readonly object[]>> = {
    overview: [{ id: 'overview', do: 'overview', of: ['data'] }],
    noise: [noise],
    map: [{ id: 'map', do: 'constant-q-map', of: ['data'] }],
    match: [
      { id: 'template', do: 'waveform', model: 'inspiral', 'mass-1': mass1, 'mass-2': mass2 },
      { id: 'match', do: 'matched-filter', of: ['data', 'template'] },
      { id: 'consistency', do: 'consistency', of: ['match'] },
    ],
  };
  return JSON.stringify({ fringe: 1, inputs: { data: input }, steps: steps[tool] });
}
