import { findNodeAtLocation, getNodeValue, parseTree, type Node, type ParseError } from 'jsonc-parser';
import { UserError } from '../data/errors';
import { hint, nearestNames } from '../data/nearest';
import type { Geodetic } from './wgs84';

/** Degrees: azimuth clockwise from north, tilt above the horizontal. */
interface Arm {
  readonly azimuth: number;
  readonly tilt: number;
}

/** An instrument's place: geodetic position on WGS 84 in degrees and metres, and its two arms. */
export interface Site extends Geodetic {
  readonly name: string;
  readonly title: string;
  readonly arms: { readonly x: Arm; readonly y: Arm };
}

const TOP_KEYS = ['$schema', 'fringe-sites', 'sites'] as const;
const SITE_KEYS = ['title', 'latitude', 'longitude', 'height', 'arms'] as const;
const ARM_KEYS = ['azimuth', 'tilt'] as const;
const NAME = /^[A-Za-z][A-Za-z0-9_-]*$/;

type Path = readonly (string | number)[];

/**
 * Reads a sites file (`*.sites.json`: JSON with comments). Throws a UserError with file, line and column at the first thing
 * that is wrong; never returns a site with a number out of range or arms that cannot sense a wave.
 */
export function parseSites(text: string, file: string): Site[] {
  const errors: ParseError[] = [];
  const root = parseTree(text, errors, { allowTrailingComma: true, disallowComments: false });
  const fail = (offset: number, code: string, message: string): never => {
    const before = text.slice(0, offset).split('\n');
    const where = `${file}:${before.length}:${before.at(-1)!.length + 1}`;
    throw new UserError(`sites-${code}`, `${where}: ${message}`, where);
  };
  if (errors[0])
    fail(errors[0].offset, 'json', 'not valid JSON from here on; compare commas, quotes and braces');
  if (root?.type !== 'object')
    return fail(0, 'json', 'a sites file is a JSON object with "fringe-sites": 1 and "sites"');

  const find = (path: Path): Node | undefined => findNodeAtLocation(root, [...path]);
  const known = (path: Path, keys: readonly string[]): void => {
    const seen = new Set<string>();
    for (const property of find(path)?.children ?? []) {
      const key = String(property.children![0].value);
      if (seen.has(key)) fail(property.offset, 'duplicate-key', `"${key}" is given twice`);
      seen.add(key);
      if (keys.length > 0 && !keys.includes(key))
        fail(property.offset, 'unknown-key', `unknown key "${key}".${hint(nearestNames(key, keys))}`);
    }
  };
  const object = (path: Path, what: string): Node => {
    const node = find(path);
    if (node?.type === 'object') return node;
    const at = node ?? find(path.slice(0, -1))!;
    return fail(
      at.offset,
      node ? 'wrong-type' : 'missing-key',
      `"${path.at(-1)}" must be an object: ${what}`,
    );
  };
  const number = (path: Path, low: number, high: number, what: string, fallback?: number): number => {
    const node = find(path);
    if (!node) {
      if (fallback !== undefined) return fallback;
      return fail(find(path.slice(0, -1))!.offset, 'missing-key', `"${path.at(-1)}" is missing: ${what}`);
    }
    const value: unknown = getNodeValue(node);
    if (typeof value === 'number' && value >= low && value <= high) return value;
    return fail(
      node.offset,
      'wrong-value',
      `"${path.at(-1)}" must be a number from ${low} to ${high}: ${what}`,
    );
  };

  known([], TOP_KEYS);
  number(['fringe-sites'], 1, 1, 'the format version');
  const sites = object(['sites'], 'a name for each site, with its position and arms');
  known(['sites'], []);
  const found = (sites.children ?? []).map((property): Site => {
    const name = String(property.children![0].value);
    const at = ['sites', name];
    if (!NAME.test(name))
      fail(
        property.offset,
        'bad-name',
        `"${name}" cannot be a site's name: use letters, digits, - and _, beginning with a letter`,
      );
    object(at, 'latitude, longitude, height and arms');
    known(at, SITE_KEYS);
    object([...at, 'arms'], '"x" and "y"');
    known([...at, 'arms'], ['x', 'y']);
    const arm = (axis: 'x' | 'y'): Arm => {
      const path = [...at, 'arms', axis];
      object(path, '"azimuth" and, if it is not level, "tilt"');
      known(path, ARM_KEYS);
      return {
        azimuth: number([...path, 'azimuth'], -360, 360, 'degrees clockwise from north'),
        tilt: number([...path, 'tilt'], -90, 90, 'degrees above the horizontal', 0),
      };
    };
    const title = find([...at, 'title']);
    if (title && title.type !== 'string') fail(title.offset, 'wrong-type', '"title" must be text');
    const site: Site = {
      name,
      title: title ? (title.value as string) : name,
      latitude: number([...at, 'latitude'], -90, 90, 'geodetic, degrees north'),
      longitude: number([...at, 'longitude'], -360, 360, 'degrees east'),
      height: number([...at, 'height'], -12_000, 12_000, 'metres above the WGS 84 ellipsoid'),
      arms: { x: arm('x'), y: arm('y') },
    };
    const cosine = cosineBetween(site.arms.x, site.arms.y);
    if (Math.abs(cosine) > 0.95)
      fail(
        find([...at, 'arms'])!.offset,
        'arms',
        `the arms of "${name}" lie along one line, so it senses almost no wave; check the azimuths`,
      );
    return site;
  });
  if (found.length === 0) fail(sites.offset, 'none', 'no site is given');
  return found;
}

function cosineBetween(a: Arm, b: Arm): number {
  const deg = Math.PI / 180;
  return (
    Math.cos(a.tilt * deg) * Math.cos(b.tilt * deg) * Math.cos((a.azimuth - b.azimuth) * deg) +
    Math.sin(a.tilt * deg) * Math.sin(b.tilt * deg)
  );
}

/** The site of that name (case does not matter), or a UserError naming the ones there are. */
export function siteNamed(sites: readonly Site[], name: string, file: string): Site {
  const site = sites.find((s) => s.name.toLowerCase() === name.toLowerCase());
  if (site) return site;
  const names = sites.map((s) => s.name);
  throw new UserError(
    'sites-unknown',
    `${file} has no site "${name}".${hint(nearestNames(name, names))} It has: ${names.join(', ')}.`,
    file,
  );
}
