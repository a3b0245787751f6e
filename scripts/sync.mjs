// Writes what derives from the step files: the registry, the recipe's schema, the step reference and the palette entries.
// `node scripts/sync.mjs --check` changes nothing and fails when something is out of date.
import { build } from 'esbuild';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import prettier from 'prettier';

const check = process.argv.includes('--check');
const stale = [];

async function put(path, text) {
  const formatted = /\.(ts|md)$/.test(path)
    ? await prettier.format(text, { filepath: path, singleQuote: true, printWidth: 110 })
    : text;
  const old = existsSync(path) ? readFileSync(path, 'utf8') : '';
  if (old === formatted) return;
  if (check) stale.push(path);
  else {
    writeFileSync(path, formatted);
    console.log(`wrote ${path}`);
  }
}

const folder = 'src/core/steps';
const ids = readdirSync(folder)
  .filter((f) => /^[a-z][a-z0-9-]*\.ts$/.test(f) && !['index.ts', 'define.ts'].includes(f))
  .map((f) => f.slice(0, -3))
  .sort();
const camel = (id) => id.replace(/-([a-z0-9])/g, (_, c) => c.toUpperCase());
await put(
  `${folder}/index.ts`,
  `// Written by \`npm run sync\`: one line per file of this folder.
import type { AnyStep } from './define';
${ids.map((id) => `import ${camel(id)} from './${id}';`).join('\n')}

/** Every step, by id. */
export const steps: Readonly<Record<string, AnyStep>> = {
${ids.map((id) => `  '${id}': ${camel(id)},`).join('\n')}
};
`,
);

// Equivalents in Python: `src/core/python/<step>.py`, and what scripts made of them share.
const pyFolder = 'src/core/python';
const pyFiles = (sub) =>
  readdirSync(join(pyFolder, sub))
    .filter((f) => f.endsWith('.py'))
    .map((f) => f.slice(0, -3))
    .sort();
const pyGroups = [
  ['stepSources', '', "Source of each step's equivalent, by the step's id."],
  ['shared', 'shared', 'Functions that several equivalents call, by their name.'],
  ['readers', 'readers', 'Readers of data files, by format.'],
  ['frame', 'frame', 'What every script has: reading and checking inputs, comparing numbers.'],
].map(([name, sub, about]) => ({ name, sub, about, files: pyFiles(sub) }));
const pyName = (g, f) => camel(`${g.name === 'stepSources' ? 'step' : g.name}-${f.replaceAll('_', '-')}`);
await put(
  `${pyFolder}/index.ts`,
  `// Written by \`npm run sync\`: the Python files of this folder as text.
${pyGroups.flatMap((g) => g.files.map((f) => `import ${pyName(g, f)} from './${g.sub ? `${g.sub}/` : ''}${f}.py';`)).join('\n')}

${pyGroups
  .map(
    (g) => `/** ${g.about} */
export const ${g.name}: Readonly<Record<string, string>> = {
${g.files.map((f) => `  '${g.sub === 'shared' ? f.replaceAll('-', '_') : f}': ${pyName(g, f)},`).join('\n')}
};`,
  )
  .join('\n\n')}
`,
);

// The descriptions come from the steps themselves, bundled on the spot.
const work = 'node_modules/.cache/fringeside-sync';
mkdirSync(work, { recursive: true });
const bundle = join(work, `steps-${process.pid}.mjs`);
await build({
  entryPoints: [`${folder}/index.ts`],
  bundle: true,
  format: 'esm',
  platform: 'node',
  loader: { '.py': 'text' },
  outfile: bundle,
  logLevel: 'error',
});
const { steps } = await import(pathToFileURL(bundle).href);
rmSync(bundle);
const all = Object.values(steps);

const schemaOf = (p) => {
  const description = `${p.label}. ${p.help}${p.unit ? ` Unit: ${p.unit}.` : ''}`;
  const bounds = {
    ...(p.min === undefined ? {} : p.exclusiveMin ? { exclusiveMinimum: p.min } : { minimum: p.min }),
    ...(p.max === undefined ? {} : { maximum: p.max }),
  };
  switch (p.kind) {
    case 'number': {
      const type = p.integer ? 'integer' : 'number';
      return { type: p.default === null ? [type, 'null'] : type, default: p.default, ...bounds, description };
    }
    case 'choice':
      return { enum: p.choices, default: p.default, description };
    case 'flag':
      return { type: 'boolean', default: p.default, description };
    case 'time':
      return { type: ['string', 'number', 'null'], description };
    case 'list':
      return {
        type: 'array',
        items: {
          anyOf: [
            { type: 'number', ...bounds },
            { type: 'array', items: { type: 'number', ...bounds } },
          ],
        },
        description,
      };
    default:
      return { type: 'string', default: p.default, description };
  }
};
const common = {
  id: {
    type: 'string',
    pattern: '^[A-Za-z][A-Za-z0-9_-]*$',
    description: 'Name of the step, used in "of" and "expect".',
  },
  of: { type: 'array', items: { type: 'string' }, description: 'Inputs and earlier steps it consumes.' },
  off: { type: 'boolean', description: 'Keep the step in the document but do not run it.' },
};
const time = { type: ['string', 'number'], description: 'GPS time in seconds; text keeps nanoseconds.' };
await put(
  'media/recipe.schema.json',
  `${JSON.stringify(
    {
      $schema: 'http://json-schema.org/draft-07/schema#',
      title: 'Fringeside recipe',
      type: 'object',
      required: ['fringe', 'inputs', 'steps'],
      additionalProperties: false,
      properties: {
        $schema: { type: 'string' },
        fringe: { const: 1, description: 'Format version.' },
        title: { type: 'string' },
        sites: { type: 'string', description: 'Sites file, relative to the recipe.' },
        inputs: {
          type: 'object',
          additionalProperties: {
            type: 'object',
            required: ['file'],
            additionalProperties: false,
            properties: {
              file: { type: 'string', description: 'Data file, relative to the recipe.' },
              channel: {
                type: 'string',
                description: 'Dataset, column or track; may be left out when the file has one.',
              },
              start: time,
              duration: { type: 'number', exclusiveMinimum: 0, description: 'Seconds from start.' },
              rate: {
                type: 'number',
                exclusiveMinimum: 0,
                description: 'Sample rate in Hz, when the file does not say it.',
              },
              epoch: {
                ...time,
                description: 'GPS time of the first sample of the channel, when the file does not say it.',
              },
              unit: { type: 'string' },
              scale: { type: 'number', description: 'Factor on every sample.' },
            },
          },
        },
        steps: {
          type: 'array',
          items: {
            type: 'object',
            required: ['id', 'do'],
            properties: { ...common, do: { enum: all.map((s) => s.id) } },
            allOf: all.map((s) => ({
              if: { properties: { do: { const: s.id } } },
              then: {
                additionalProperties: false,
                description: s.summary,
                properties: {
                  id: true,
                  do: true,
                  of: true,
                  off: true,
                  ...Object.fromEntries(Object.entries(s.params).map(([k, p]) => [k, schemaOf(p)])),
                },
              },
            })),
          },
        },
        expect: {
          type: 'object',
          additionalProperties: {
            type: 'object',
            required: ['value'],
            additionalProperties: false,
            properties: {
              value: { type: 'number' },
              rel: { type: 'number', minimum: 0 },
              abs: { type: 'number', minimum: 0 },
            },
          },
        },
      },
    },
    null,
    2,
  )}\n`,
);

const bounds = (p) =>
  [
    p.min !== undefined && `${p.exclusiveMin ? '>' : '≥'} ${p.min}`,
    p.max !== undefined && `≤ ${p.max}`,
    p.choices?.join(' · '),
  ]
    .filter(Boolean)
    .join(', ');
const cellText = (s) => String(s).replaceAll('|', '\\|');
const reference = all
  .map((s) => {
    const rows = Object.entries(s.params).map(
      ([k, p]) =>
        `| \`${k}\` | ${p.unit ?? ''} | \`${JSON.stringify(p.default)}\` | ${cellText(bounds(p))} | ${cellText(`${p.label}. ${p.help}`)} |`,
    );
    return `## ${s.id}

${s.title} (version ${s.version}). ${s.summary}

Takes ${s.takes.map((t) => `${t.kind}${t.count === 'one' ? '' : ` (${t.count})`}: ${t.help}`).join('; ') || 'nothing'}. Gives ${s.gives}.

${rows.length > 0 ? `| parameter | unit | default | bounds | meaning |\n| --- | --- | --- | --- | --- |\n${rows.join('\n')}` : 'No parameters.'}

Sources: ${s.sources.map((x) => `${x.text} [${x.flag}]`).join('; ') || 'none'}.
`;
  })
  .join('\n');
mkdirSync('docs', { recursive: true });
await put(
  'docs/steps.md',
  `<!-- Written by \`npm run sync\` from src/core/steps. -->\n\n# Steps\n\nThe mark behind a source says how it entered: read in the source, from memory, computed here, or common practice with no source.\n\n${reference}`,
);

// Palette: one command per step, so that each is found by name; those that a data file alone can feed are in the
// Explorer's menu too.
const manifest = JSON.parse(readFileSync('package.json', 'utf8'));
if (manifest.contributes?.commands) {
  const prefix = 'fringeside.addStep.';
  const { menus } = manifest.contributes;
  const others = (list) => (list ?? []).filter((c) => !c.command?.startsWith(prefix));
  const needs = (s) => s.takes.filter((t) => t.count !== 'optional');
  const ofData = (s) => needs(s).length === 1 && needs(s)[0].kind === 'series';
  const data = 'activeCustomEditorId =~ /^fringeside\\.data/';
  const order = ['look', 'noise', 'condition', 'picture', 'signal', 'search'];
  manifest.contributes.commands = [
    ...others(manifest.contributes.commands),
    ...all.map((s) => ({
      command: `${prefix}${s.id}`,
      title: `Add Step: ${s.title}`,
      category: 'Fringeside',
    })),
  ];
  menus.commandPalette = [
    ...others(menus.commandPalette),
    ...all.map((s) => ({
      command: `${prefix}${s.id}`,
      when: ofData(s) ? `fringeside.lookActive || ${data}` : 'fringeside.lookActive',
    })),
  ];
  menus['fringeside.analyse'] = [
    ...others(menus['fringeside.analyse']),
    ...all
      .filter(ofData)
      .map((s) => ({ command: `${prefix}${s.id}`, group: `${order.indexOf(s.group) + 1}_${s.group}` })),
  ];
  await put(
    'package.json',
    await prettier.format(JSON.stringify(manifest), { parser: 'json-stringify', printWidth: 110 }),
  );
}

if (stale.length > 0) {
  console.error(`out of date, run npm run sync: ${stale.join(', ')}`);
  process.exit(1);
}
