import type { BrowserContext } from 'playwright-core';
import { installedExtension, type Profile } from './profile';
import type { Tally } from './runner';
import type { EditorServer } from './server';

/** The whole host suite, the loading of its window included. */
const HOST_TIMEOUT = 300_000;

/**
 * Runs the bundled host suite inside the extension host, where the vscode API is. The workbench takes the paths from
 * the page's address and reports through two functions on the page, as the editor's own browser tests do.
 */
export async function runHostSuite(
  context: BrowserContext,
  server: EditorServer,
  profile: Profile,
  suiteFile: string,
): Promise<Tally> {
  const tally: Tally = { passed: 0, failed: 0, retried: 0 };
  const page = await context.newPage();
  let timer: NodeJS.Timeout | undefined;
  const exit = new Promise<number | 'late'>((resolve) => {
    timer = setTimeout(() => resolve('late'), HOST_TIMEOUT);
    void page.exposeFunction('codeAutomationExit', (code: number) => resolve(code));
  });
  await page.exposeFunction('codeAutomationLog', (_type: string, args: unknown[]) => {
    const text = args.map(String).join(' ');
    const result = /^(not ok|ok) - /.exec(text);
    if (result === null) return;
    if (result[1] === 'ok') tally.passed++;
    else tally.failed++;
    console.log(text.replace(' - ', ' - host: '));
  });
  const remote = (path: string): string => `vscode-remote://127.0.0.1:${server.port}${path}`;
  const payload = [
    // the suite runs only for an extension under development: the installed one is named as that
    ['extensionDevelopmentPath', remote(installedExtension(profile))],
    ['extensionTestsPath', remote(suiteFile)],
    ['enableProposedApi', ''],
  ];
  const query = new URLSearchParams({ folder: profile.workspace, payload: JSON.stringify(payload) });
  await page.goto(`${server.url}/?${query.toString()}`);
  const code = await exit;
  clearTimeout(timer);
  await page.close();
  if (code !== 0 && tally.failed === 0) {
    tally.failed++;
    console.log(
      `not ok - host: the suite ended with ${code === 'late' ? 'no answer in time' : `code ${code}`}`,
    );
  }
  if (tally.passed + tally.failed === 0) {
    tally.failed++;
    console.log('not ok - host: the suite ran no test');
  }
  return tally;
}
