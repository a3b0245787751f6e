import { parseGps } from '../../src/core/data/gps-time';
import type { ChannelAnswers } from '../../src/core/protocol/panel';

export type AnswersReading =
  | { readonly ok: true; readonly answers: ChannelAnswers; readonly rate?: never; readonly epoch?: never }
  | { readonly ok: false; readonly rate?: string; readonly epoch?: string };

/** Reads the rate form: the rate must be a number above 0, the time may be empty. */
export function readAnswers(rate: string, epoch: string): AnswersReading {
  const hz = Number(rate.trim());
  const wrongRate =
    rate.trim() === '' || !(hz > 0) || !Number.isFinite(hz)
      ? 'The rate must be a number of Hz above 0, for example 4096.'
      : undefined;
  let wrongEpoch: string | undefined;
  try {
    if (epoch.trim() !== '') parseGps(epoch);
  } catch (e) {
    wrongEpoch = e instanceof Error ? `${e.message}.` : 'The time is not a GPS time.';
  }
  if (wrongRate !== undefined || wrongEpoch !== undefined)
    return {
      ok: false,
      ...(wrongRate === undefined ? {} : { rate: wrongRate }),
      ...(wrongEpoch === undefined ? {} : { epoch: wrongEpoch }),
    };
  return { ok: true, answers: { rate: hz, ...(epoch.trim() === '' ? {} : { epoch: epoch.trim() }) } };
}
