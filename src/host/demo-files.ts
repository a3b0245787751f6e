import { createHash } from 'node:crypto';
import { existsSync, readFileSync, statSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { UserError } from '../core/data/errors';
import { noiseTable } from '../core/demo/noise-table';
import { DEMO_SITES } from '../core/demo/scenario';
import { synthesise, type SiteData } from '../core/demo/synthesise';
import { demoTruth } from '../core/demo/truth';
import { sameStrain, samplesSha256, writeStrain } from './demo-strain';
import { initReaders } from './open-file';
import { writeAtomically } from './write-atomically';

export interface DemoFile {
  readonly name: string;
  /** False when the file was there already with the same content. */
  readonly written: boolean;
  readonly sha256: string;
  /** What the hash is over; HDF5 files carry the time they were made, so theirs is over the samples. */
  readonly hashOf: 'bytes' | 'samples';
}

interface Planned extends Omit<DemoFile, 'written'> {
  same(path: string): boolean;
  write(path: string): void;
}

/** Folder with the recipe and the sites file: `media/demo` seen from `src/host` or from the bundle in `dist`. */
function templates(): string {
  const found = ['../media/demo', '../../media/demo']
    .map((p) => fileURLToPath(new URL(p, import.meta.url)))
    .find((p) => existsSync(join(p, 'demo.fringe.json')));
  if (found === undefined) throw new Error('media/demo is missing from the installed program');
  return found;
}

function textFile(name: string, text: string): Planned {
  return {
    name,
    sha256: createHash('sha256').update(text).digest('hex'),
    hashOf: 'bytes',
    same: (path) => statSync(path).isFile() && readFileSync(path, 'utf8') === text,
    write: (path) => writeAtomically(path, text),
  };
}

/** The data of all sites, in the order of `DEMO_SITES`: 16 MB, about two seconds of work. */
function demoData(): SiteData[] {
  return DEMO_SITES.map(synthesise);
}

/**
 * Writes the demo into `dir` (made if absent): strain of the two invented sites, their true noise curves, the sites file, the
 * recipe and the truth. Files that are there with the same content are left alone. If any differs nothing is written.
 *
 * @throws UserError naming the file that differs, or the reason why a file cannot be written
 */
export async function writeDemo(dir: string, data = demoData()): Promise<DemoFile[]> {
  await initReaders();
  const from = templates();
  const files: Planned[] = [
    ...DEMO_SITES.map(({ site }, i): Planned => {
      const { samples } = data[i];
      return {
        name: `${site.name}.h5`,
        sha256: samplesSha256(samples),
        hashOf: 'samples',
        same: (path) => sameStrain(path, samples),
        write: (path) => writeStrain(path, site.title, samples),
      };
    }),
    ...DEMO_SITES.map(({ site, noise }) => textFile(`${site.name}-noise.txt`, noiseTable(noise, site.title))),
    textFile('demo.truth.json', `${JSON.stringify(demoTruth(data), null, 2)}\n`),
    ...['demo.sites.json', 'demo.fringe.json'].map((name) =>
      textFile(name, readFileSync(join(from, name), 'utf8')),
    ),
  ];
  const missing = new Set<Planned>();
  for (const file of files) {
    const path = join(dir, file.name);
    if (!existsSync(path)) missing.add(file);
    else if (!file.same(path))
      throw new UserError(
        'demo-differs',
        `${path} is there already and is not what this program would write. Nothing was written; choose another folder, or rename or remove the file.`,
        path,
      );
  }
  for (const file of missing) file.write(join(dir, file.name));
  return files.map((file) => ({
    name: file.name,
    written: missing.has(file),
    sha256: file.sha256,
    hashOf: file.hashOf,
  }));
}
