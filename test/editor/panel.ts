import type { Frame, Locator } from 'playwright-core';
import type { Workbench } from './workbench';

/** What the pages promise to tests: attributes, not looks. */
export type CardState = 'waiting' | 'running' | 'done' | 'failed' | 'cancelled' | 'stale';

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
