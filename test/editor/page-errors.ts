import type { Page } from 'playwright-core';

/** Collects what goes wrong in the extension's own pages; the workbench's own noise is none of our business. */
export interface PageErrors {
  /** Errors since the last call. A test that expects some takes them; what is left fails it. */
  take(): string[];
}

/** Webview documents (violated content policies name the outer one) and the resources that the editor serves to them. */
const ownPage = /\/webview\/browser\/pre\/(fake|index)\.html|\.vscode-resource\.vscode-cdn\.net/;

/** Starts to listen: console errors (with violated content policies) and uncaught errors, by where they come from. */
export function watchPageErrors(page: Page): PageErrors {
  let errors: string[] = [];
  page.on('console', (message) => {
    const { url, lineNumber } = message.location();
    if (message.type() === 'error' && ownPage.test(url))
      errors.push(`console: ${message.text()} (${fileName(url)}:${lineNumber})`);
  });
  page.on('pageerror', (error) => {
    const where = error.stack ?? '';
    if (ownPage.test(where)) errors.push(`uncaught: ${where.replace(/https?:[^\s)]+\//g, '')}`);
  });
  return {
    take() {
      const taken = errors;
      errors = [];
      return taken;
    },
  };
}

const fileName = (url: string): string => url.replace(/\?.*$/s, '').replace(/^.*\//s, '');
