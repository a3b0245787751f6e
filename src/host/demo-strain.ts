import { createHash } from 'node:crypto';
import { closeSync, existsSync, fsyncSync, mkdirSync, openSync, renameSync, rmSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import * as h5 from 'h5wasm/node';
import { UserError } from '../core/data/errors';
import { formatGps } from '../core/data/gps-time';
import { DEMO_RATE, DEMO_START } from '../core/demo/scenario';
import { captureMessages, reasonOf } from './hdf5-messages';
import { openDataFile } from './open-file';

const CHANNEL = '/strain';

/** SHA-256 over the samples as little-endian float64, NaN as 7ff8000000000000: the definition used for a recipe's inputs. */
export function samplesSha256(samples: Float64Array): string {
  const bytes = new DataView(new ArrayBuffer(samples.length * 8));
  for (let i = 0; i < samples.length; i++) {
    const v = samples[i];
    if (Number.isNaN(v)) bytes.setBigUint64(i * 8, 0x7ff8000000000000n, true);
    else bytes.setFloat64(i * 8, v, true);
  }
  return createHash('sha256').update(bytes).digest('hex');
}

/** Whether the file at `path` holds these samples with the demo's rate, start and unit; false too when it cannot be read. */
export function sameStrain(path: string, samples: Float64Array): boolean {
  try {
    const file = openDataFile(path);
    try {
      const channel = file.channels.find((c) => c.name === CHANNEL);
      if (
        channel?.length !== samples.length ||
        channel.rate?.value !== DEMO_RATE ||
        channel.start === undefined ||
        formatGps(channel.start.value) !== String(DEMO_START) ||
        channel.unit?.value !== 'strain'
      )
        return false;
      const found = new Float64Array(samples.length);
      file.read(CHANNEL, 0, found.length, found);
      return found.every((v, i) => Object.is(v, samples[i]));
    } finally {
      file.close();
    }
  } catch (e) {
    if (e instanceof UserError) return false;
    throw e;
  }
}

/**
 * Writes samples as dataset /strain of an HDF5 file, complete under a temporary name first. The HDF5 library must be loaded.
 *
 * @throws UserError with the library's or the system's reason; then nothing is left behind
 */
export function writeStrain(path: string, title: string, samples: Float64Array): void {
  const part = join(dirname(path), `.${basename(path)}.${String(process.pid)}.part`);
  const stop = captureMessages();
  let messages: string | undefined;
  try {
    mkdirSync(dirname(path), { recursive: true });
    fill(part, title, samples);
    messages = stop();
    // The library reports a full disk only in passing, so what was written is read back.
    if (!sameStrain(part, samples)) throw new Error(reasonOf(messages));
    const fd = openSync(part, 'r+');
    try {
      fsyncSync(fd);
    } finally {
      closeSync(fd);
    }
    renameSync(part, path);
  } catch (e) {
    if (existsSync(part)) rmSync(part);
    const reason = e instanceof Error ? e.message : String(e);
    throw new UserError(
      'cannot-write',
      `${path} cannot be written: ${reason}. Nothing was changed there.`,
      path,
    );
  } finally {
    if (messages === undefined) stop();
  }
}

function fill(path: string, title: string, samples: Float64Array): void {
  const file = new h5.File(path, 'w');
  try {
    const strain = file.create_dataset({ name: 'strain', data: samples });
    strain.create_attribute('sample rate (Hz)', DEMO_RATE);
    strain.create_attribute('start (GPS s)', DEMO_START);
    strain.create_attribute('unit', 'strain');
    strain.create_attribute('site', title);
    strain.create_attribute('about', 'invented data of an invented instrument, made by Fringeside');
  } finally {
    file.close();
  }
}
