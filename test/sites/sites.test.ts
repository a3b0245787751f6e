import { describe, expect, test } from 'vitest';
import { parseSites, siteNamed } from '../../src/core/sites/sites';

const site = {
  latitude: 10,
  longitude: 20,
  height: 30,
  arms: { x: { azimuth: 40 }, y: { azimuth: 130 } },
};
const file = (sites: unknown, top: object = { 'fringe-sites': 1 }): string =>
  JSON.stringify({ ...top, sites });
const parse = (text: string) => parseSites(text, 'my.sites.json');

test('comments, titles and tilts are read; a level arm needs no tilt', () => {
  const text = `// ours
  { "fringe-sites": 1, "sites": { "elm": { "title": "Elm", "latitude": -10.5, "longitude": 300, "height": -3,
    "arms": { "x": { "azimuth": 5 }, "y": { "azimuth": 95, "tilt": -0.02 } } }, } }`;
  expect(parse(text)).toEqual([
    {
      name: 'elm',
      title: 'Elm',
      latitude: -10.5,
      longitude: 300,
      height: -3,
      arms: { x: { azimuth: 5, tilt: 0 }, y: { azimuth: 95, tilt: -0.02 } },
    },
  ]);
});

describe('one clear error for', () => {
  const arms = (x: unknown, y: unknown) => ({ ...site, arms: { x, y } });
  test.each<[string, string, string | RegExp]>([
    ['broken JSON', '{ "fringe-sites": 1, "sites": { ', /my\.sites\.json:1:\d+: not valid JSON/],
    ['no object', '[]', 'a sites file is a JSON object'],
    ['empty text', '', 'not valid JSON'],
    ['no version', file({ elm: site }, {}), '"fringe-sites" is missing: the format version'],
    [
      'another version',
      file({ elm: site }, { 'fringe-sites': 2 }),
      '"fringe-sites" must be a number from 1 to 1',
    ],
    ['no sites', '{ "fringe-sites": 1 }', '"sites" must be an object'],
    ['no site', file({}), 'no site is given'],
    [
      'a misspelt key',
      file({ elm: { ...site, latitde: 1 } }),
      'unknown key "latitde". Did you mean "latitude"?',
    ],
    [
      'a misspelt key of an arm',
      file({ elm: arms({ azimut: 1 }, { azimuth: 2 }) }),
      'Did you mean "azimuth"?',
    ],
    ['a third arm', file({ elm: { ...site, arms: { ...site.arms, z: { azimuth: 0 } } } }), 'unknown key "z"'],
    ['a missing number', file({ elm: { ...site, height: undefined } }), '"height" is missing: metres above'],
    [
      'a text for a number',
      file({ elm: { ...site, latitude: '10' } }),
      '"latitude" must be a number from -90 to 90',
    ],
    [
      'a latitude beyond the pole',
      file({ elm: { ...site, latitude: 91 } }),
      '"latitude" must be a number from -90 to 90',
    ],
    ['no arms', file({ elm: { ...site, arms: undefined } }), '"arms" must be an object'],
    ['one arm', file({ elm: { ...site, arms: { x: { azimuth: 1 } } } }), '"y" must be an object'],
    ['arms along one line', file({ elm: arms({ azimuth: 10 }, { azimuth: 190 }) }), 'lie along one line'],
    ['a name with a blank', file({ 'el m': site }), "cannot be a site's name"],
    ['a title that is no text', file({ elm: { ...site, title: 5 } }), '"title" must be text'],
    ['a name given twice', '{"fringe-sites":1,"sites":{"elm":{},"elm":{}}}', '"elm" is given twice'],
    ['an infinite number', '{"fringe-sites":1,"sites":{"elm":{"latitude":1e999}}}', /must be/],
  ])('%s', (_, text, message) => {
    expect(() => parse(text)).toThrow(message);
    expect(() => parse(text)).toThrow(expect.objectContaining({ name: 'UserError' }));
  });

  test('the place is line and column', () => {
    const text = '{\n  "fringe-sites": 1,\n  "sites": { "elm": { "lat": 3 } }\n}';
    expect(() => parse(text)).toThrow('my.sites.json:3:23: unknown key "lat"');
  });
});

test('a site is found by name whatever the case, else the names are told', () => {
  const sites = parse(file({ elm: site, oak: site }));
  expect(siteNamed(sites, 'Oak', 'f').name).toBe('oak');
  expect(() => siteNamed(sites, 'eln', 'f')).toThrow(
    'f has no site "eln". Did you mean "elm"? It has: elm, oak.',
  );
});
