import { readFileSync } from 'node:fs';
import { basename, join } from 'node:path';
import type { RunResult } from '../../core/protocol/engine';
import type { RecipeFile } from '../cli/recipe-file';
import { CAUTION } from '../cli/result-text';
import { safe, scriptJson, type Html } from './html';
import { cardSection, inputSection } from './sections';

/**
 * One HTML file with everything in it: text, numbers and tables that need no script, figures that can be zoomed without
 * a network, and the recipe itself. `dist` holds the page's script and style. Contains no time stamp, so the same result gives the same file.
 */
export function reportHtml(recipe: RecipeFile, result: RunResult, dist: string): string {
  const asset = (name: string): Html => ({
    html: readFileSync(join(dist, name), 'utf8').replace(/<\/script/gi, '<\\/script'),
  });
  let figures = 0;
  const cards = result.cards.map((card) => {
    const section = cardSection(card, figures);
    if (card.state === 'done') figures += card.figures.length;
    return section;
  });
  const data = scriptJson(result.cards.flatMap((c) => (c.state === 'done' ? c.figures : [])));
  const name = basename(recipe.path);
  const { version, kernels } = result.engine;
  return `<!DOCTYPE html>\n${
    safe`<html lang="en">
      <head>
        <meta charset="utf-8" />
        <meta name="viewport" content="width=device-width, initial-scale=1" />
        <meta
          http-equiv="Content-Security-Policy"
          content="default-src 'none'; style-src 'unsafe-inline'; script-src 'unsafe-inline'; img-src data: blob:"
        />
        <title>${name}</title>
        <style>
          ${asset('report.css')}
        </style>
      </head>
      <body>
        <header>
          <h1>${name}</h1>
          <p class="caution">${CAUTION}</p>
          <p>Made by Fringeside ${version} (${kernels} kernels).</p>
        </header>
        <main>
          ${result.inputs.map(inputSection)}${cards}
          <section>
            <h2>Recipe</h2>
            <pre>${recipe.text}</pre>
          </section>
        </main>
        <script type="application/json" id="figures">
          ${{ html: data }}
        </script>
        <script>
          ${asset('report-plotly.min.js')};
        </script>
        <script>
          ${asset('report.js')};
        </script>
      </body>
    </html>`.html
  }\n`;
}
