import { mkdirSync } from 'node:fs';
import { dirname, join } from 'node:path';
import type { Frame, Locator, Page } from 'playwright-core';
import { STATE_TIMEOUT, until } from './options';
import type { PageErrors } from './page-errors';
import { changeSettings, hostLog, type Profile } from './profile';

/** The editor's built-in themes, one per kind: how workbench and webviews say that they show it. */
const themes = {
  'Default Dark Modern': ['vscode-theme-defaults-themes-dark_modern-json', 'vscode-dark'],
  'Default Light Modern': ['vscode-theme-defaults-themes-light_modern-json', 'vscode-light'],
  'Default High Contrast': ['vscode-theme-defaults-themes-hc_black-json', 'vscode-high-contrast'],
  'Default High Contrast Light': ['vscode-theme-defaults-themes-hc_light-json', 'vscode-high-contrast-light'],
} as const;

export type Theme = keyof typeof themes;
export const themeNames = Object.keys(themes) as Theme[];

/** One window of the editor, and what a person does in it. Every wait is for a state, never for a time. */
export class Workbench {
  readonly page: Page;
  readonly profile: Profile;
  readonly errors: PageErrors;
  /** The repository, for the built command line. */
  readonly root: string;
  readonly #url: string;
  readonly #screenshots: string;

  constructor(parts: {
    page: Page;
    profile: Profile;
    errors: PageErrors;
    root: string;
    url: string;
    screenshots: string;
  }) {
    this.page = parts.page;
    this.profile = parts.profile;
    this.errors = parts.errors;
    this.root = parts.root;
    this.#url = parts.url;
    this.#screenshots = parts.screenshots;
  }

  /** The folder that the window shows; suites put their files there. */
  get workspace(): string {
    return this.profile.workspace;
  }

  /** Loads the window anew and waits until its extension host takes commands. */
  async load(): Promise<void> {
    const started = (): number => hostLog(this.profile).split('Eager extensions activated').length;
    const before = started();
    await this.page.goto(`${this.#url}/?folder=${encodeURIComponent(this.workspace)}`);
    await this.page.locator('.monaco-workbench').waitFor();
    await this.page.locator('.explorer-folders-view').waitFor();
    await until('the extension host to start', () => started() > before);
  }

  /** Runs a command by its full title ("Category: Title"). */
  async runCommand(title: string, timeout = STATE_TIMEOUT): Promise<void> {
    await this.#inPalette(title, (entry) => entry.click({ timeout: 3000 }), timeout);
  }

  /** Waits until the palette offers a command; false when it does not within the time. */
  async offersCommand(title: string, timeout = 15_000): Promise<boolean> {
    try {
      await this.#inPalette(title, (entry) => entry.waitFor({ timeout: 3000 }), timeout);
    } catch {
      return false;
    }
    await this.page.keyboard.press('Escape');
    return true;
  }

  /** The palette lists what is known when it opens and is not refreshed, so it is reopened until the entry is there. */
  async #inPalette(title: string, act: (entry: Locator) => Promise<void>, timeout: number): Promise<void> {
    const palette = this.page.locator('.quick-input-widget');
    const label = palette.locator('.monaco-list-row .label-name').filter({ hasText: exactly(title) });
    await until(
      `the palette to offer "${title}"`,
      async () => {
        await this.page.keyboard.press('F1');
        try {
          await palette.locator('input[type=text]').first().fill(`>${title}`, { timeout: 5000 });
          await act(label.first());
          return true;
        } catch (error) {
          await this.page.keyboard.press('Escape');
          throw error;
        }
      },
      timeout,
    );
  }

  /** Opens a file as a person does: double click in the Explorer, folders on the way unfolded. */
  async openFile(path: string): Promise<void> {
    const explorer = this.page.locator('.explorer-folders-view');
    if (!(await explorer.isVisible())) await this.runCommand('View: Show Explorer');
    const names = path.split('/');
    for (const [depth, name] of names.entries()) {
      const row = explorer
        .locator(`.monaco-list-row[aria-level="${depth + 1}"]`)
        .filter({ has: this.page.locator('.label-name', { hasText: exactly(name) }) })
        .first();
      await row.waitFor();
      if (depth === names.length - 1) await row.dblclick();
      else if ((await row.getAttribute('aria-expanded')) !== 'true') await row.click();
    }
  }

  /** The inner document of the visible webview that shows the selector; hidden webviews keep theirs. */
  async webviewFrame(selector: string, timeout = STATE_TIMEOUT): Promise<Frame> {
    return until(
      `a visible webview with ${selector}`,
      async () => {
        for (const frame of await this.#shownWebviews())
          if (await frame.locator(selector).first().isVisible()) return frame;
        return undefined;
      },
      timeout,
    );
  }

  /** Inner documents of the webviews that are not hidden. */
  async #shownWebviews(): Promise<Frame[]> {
    const shown: Frame[] = [];
    for (const frame of this.page.frames()) {
      const outer = frame.parentFrame();
      if (outer === null || !frame.url().includes('/webview/browser/pre/fake.html')) continue;
      const element = await outer.frameElement().catch(() => undefined);
      if (await element?.isVisible()) shown.push(frame);
    }
    return shown;
  }

  /** Waits for an editor tab with exactly this label. */
  async tab(label: string): Promise<Locator> {
    const found = this.page.locator('.tabs-container .tab').filter({
      has: this.page.locator('.label-name', { hasText: exactly(label) }),
    });
    await found.first().waitFor();
    return found.first();
  }

  /** Closes every editor, answering "Don't Save" where it asks. */
  async closeAllEditors(): Promise<void> {
    const tabs = this.page.locator('.tabs-container .tab');
    if ((await tabs.count()) === 0) return;
    await this.runCommand('View: Close All Editors');
    const discard = this.page.locator('.monaco-dialog-box').getByRole('button', { name: "Don't Save" });
    await until('all editors to close', async () => {
      if (await discard.isVisible()) await discard.click();
      return (await tabs.count()) === 0;
    });
  }

  /** Changes settings while the editor runs (undefined takes one back); the caller waits for what should follow. */
  changeSettings(change: Readonly<Record<string, unknown>>): void {
    changeSettings(this.profile, change);
  }

  /** Switches the colour theme and waits until the workbench and the visible webviews show it. */
  async setTheme(theme: Theme): Promise<void> {
    const [workbenchClass, webviewKind] = themes[theme];
    this.changeSettings({ 'workbench.colorTheme': theme });
    await this.page.locator(`.monaco-workbench.${workbenchClass}`).waitFor();
    await until(`the webviews to show ${theme}`, async () => {
      const frames = await this.#shownWebviews();
      const kinds = await Promise.all(
        frames.map((frame) => frame.locator('body').getAttribute('data-vscode-theme-kind')),
      );
      return kinds.every((kind) => kind === webviewKind);
    });
  }

  /** Saves a picture of the whole window, or of a part of it, as <name>.png; returns its path. */
  async screenshot(name: string, part?: Locator): Promise<string> {
    const path = join(this.#screenshots, `${name}.png`);
    mkdirSync(dirname(path), { recursive: true });
    await (part ?? this.page).screenshot({ path, animations: 'disabled' });
    return path;
  }
}

/** A pattern for exactly this text. */
const exactly = (text: string): RegExp =>
  new RegExp(`^\\s*${text.replace(/[.*+?^${}()|[\]\\]/g, '\\$&')}\\s*$`);
