import { cpSync, mkdirSync, readdirSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { chromium } from 'playwright-core';
import { runHostSuite } from './host-run';
import { STATE_TIMEOUT, type RunOptions } from './options';
import { watchPageErrors } from './page-errors';
import { hostLog, prepareProfile } from './profile';
import { runSuites, type Tally } from './runner';
import { startServer } from './server';
import { suites } from './suites';
import { Workbench } from './workbench';

const chromiumFlags = [
  '--no-sandbox', // root in a container
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

/** One start of editor and browser, all suites in it, then the host suite; prints a line per test and the closing line. */
export async function run(options: RunOptions): Promise<Tally> {
  const lap = stopwatch();
  const profile = prepareProfile({
    dir: options.runDir,
    serverDir: options.serverDir,
    vsix: options.vsix,
    theme: 'Default Light Modern',
  });
  for (const suite of suites) await suite.seed?.(profile.workspace, options.root);
  lap('profile and workspace');
  const screenshots = join(options.outDir, 'screenshots');
  removeOldFailures(screenshots);

  const server = await startServer(profile);
  const browser = await chromium.launch({ executablePath: options.chromium, args: chromiumFlags });
  const tally: Tally = { passed: 0, failed: 0, retried: 0 };
  const add = (part: Tally): void => {
    tally.passed += part.passed;
    tally.failed += part.failed;
    tally.retried += part.retried;
  };
  try {
    const context = await browser.newContext({ viewport: { width: 1440, height: 900 } });
    await context.grantPermissions(['clipboard-read', 'clipboard-write'], { origin: server.url });
    context.setDefaultTimeout(STATE_TIMEOUT);
    const page = await context.newPage();
    const errors = watchPageErrors(page);
    const workbench = new Workbench({
      page,
      profile,
      errors,
      root: options.root,
      url: server.url,
      screenshots,
    });
    await workbench.load();
    lap('editor and browser');
    add(await runSuites(workbench, suites, options.filter));
    lap('window suites');
    await workbench.closeAllEditors();
    await page.close();
    if ('host'.includes(options.filter) || options.filter.startsWith('host')) {
      add(await runHostSuite(context, server, profile, options.hostSuite));
      lap('host suite');
    }
  } catch (error) {
    tally.failed++;
    console.log('not ok - the run itself');
    console.log(error);
  } finally {
    await browser.close();
    await server.stop();
  }
  if (tally.failed > 0) keepLogs(profile.dir, join(options.outDir, 'editor-logs'), hostLog(profile));
  if (tally.retried > 0) console.log(`${tally.retried} retried`);
  console.log(`${tally.passed} passed, ${tally.failed} failed`);
  return tally;
}

function removeOldFailures(screenshots: string): void {
  mkdirSync(screenshots, { recursive: true });
  for (const name of readdirSync(screenshots))
    if (name.startsWith('failed-')) rmSync(join(screenshots, name));
}

/** Keeps the editor's logs of a failed run, and shows the errors that the extension host wrote down. */
function keepLogs(runDir: string, target: string, log: string): void {
  rmSync(target, { recursive: true, force: true });
  cpSync(join(runDir, 'user/logs'), target, { recursive: true });
  cpSync(join(runDir, 'server.log'), join(target, 'server.log'));
  console.log(`logs: ${target}`);
  const lines = log.split('\n').filter((line) => line.includes('[error]'));
  for (const line of lines.slice(-20)) console.log(`    ${line}`);
}

function stopwatch(): (part: string) => void {
  let last = performance.now();
  return (part) => {
    const now = performance.now();
    console.log(`# ${part}: ${((now - last) / 1000).toFixed(1)} s`);
    last = now;
  };
}
