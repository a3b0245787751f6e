import type { Frame, Locator } from 'playwright-core';
import { until } from './options';
import type { Workbench } from './workbench';

/** What the pages promise to tests: attributes, not looks. */
export type CardState = 'waiting' | 'running' | 'done' | 'failed' | 'cancelled' | 'stale' | 'off' | 'blocked';

/** The visible data file page. */
export const dataView = (workbench: Workbench): Promise<Frame> =>
  workbench.webviewFrame('[data-view="data"]');

/** The visible look panel. */
export const lookView = (workbench: Workbench): Promise<Frame> =>
  workbench.webviewFrame('[data-view="look"]');

/** Opens a data file and starts a look on it; the panel's frame. */
export async function startLook(workbench: Workbench, path: string): Promise<Frame> {
  await workbench.openFile(path);
  const data = await dataView(workbench);
  await data.locator('[data-action="start-look"]').first().click();
  return lookView(workbench);
}

/** The card of a step. */
export const card = (look: Frame, step: string): Locator => look.locator(`section[data-card="${step}"]`);

/** Waits until the card of a step is in a state; gives the card. */
export async function cardIn(look: Frame, step: string, state: CardState): Promise<Locator> {
  const found = look.locator(`section[data-card="${step}"][data-state="${state}"]`);
  await found.waitFor();
  return found;
}

/** The input of a parameter on a step's card. */
export const parameter = (look: Frame, step: string, name: string): Locator =>
  card(look, step).locator(`[data-param="${name}"]`);

/** Opens the parameters of a step's card, unless they are open. */
export async function openParameters(look: Frame, step: string): Promise<void> {
  const button = card(look, step).locator('[data-action="params"]');
  if ((await button.getAttribute('aria-expanded')) !== 'true') await button.click();
}

/** Waits until every figure inside is drawn: its plot holds at least one curve with points, or an image. */
export async function drawn(inside: Locator): Promise<void> {
  const plots = inside.locator('.plot');
  await plots.first().waitFor();
  await until('the plots to be drawn', async () => {
    const all = await plots.all();
    const marks = await Promise.all(
      all.map((plot) => plot.evaluate((e) => e.querySelectorAll('.trace path[d], .imagelayer image').length)),
    );
    return marks.length > 0 && marks.every((count) => count > 0);
  });
}

/** The shown text of a number of a card, with its unit. */
export async function shownNumber(look: Frame, step: string, number: string): Promise<string> {
  return look.locator(`[data-number="${step}.${number}"] .value`).innerText();
}
