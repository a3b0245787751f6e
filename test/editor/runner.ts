import { stripVTControlCharacters } from 'node:util';
import type { Workbench } from './workbench';

/** Tests of one subject, run in order in the one window of the run. */
export interface EditorSuite {
  readonly name: string;
  /** Puts files into the workspace folder before the editor starts; `root` is the repository with dist/. */
  readonly seed?: (workspace: string, root: string) => void | Promise<void>;
  /**
   * Brings the state that every test of the suite begins with (all editors are closed before). It runs once, and again
   * after a failed attempt, so a test may use what `start` did but not what an earlier test did.
   */
  readonly start?: (workbench: Workbench) => Promise<void>;
  readonly tests: Readonly<Record<string, (workbench: Workbench) => Promise<void>>>;
}

export interface Tally {
  passed: number;
  failed: number;
  retried: number;
}

/** A test that takes longer hangs; single waits give up earlier. */
const TEST_TIMEOUT = 240_000;

/** Runs the suites' tests that the filter names; a failed one gets a second and last attempt, and says so. */
export async function runSuites(
  workbench: Workbench,
  suites: readonly EditorSuite[],
  filter: string,
): Promise<Tally> {
  const tally: Tally = { passed: 0, failed: 0, retried: 0 };
  for (const suite of suites) {
    let ready = false;
    for (const [title, test] of Object.entries(suite.tests)) {
      const name = `${suite.name}: ${title}`;
      if (!name.includes(filter)) continue;
      const began = performance.now();
      const attempt = async (): Promise<void> => {
        if (!ready) {
          await workbench.closeAllEditors();
          workbench.errors.take();
          await suite.start?.(workbench);
          ready = true;
        }
        await test(workbench);
        const errors = workbench.errors.take();
        if (errors.length > 0) throw new Error(`the page reported errors:\n${errors.join('\n')}`);
      };
      for (const again of [false, true]) {
        try {
          await inTime(attempt);
          tally.passed++;
          console.log(`ok - ${name}${again ? ' (on the second attempt)' : ''} (${seconds(began)} s)`);
          break;
        } catch (error) {
          ready = false;
          await showFailure(workbench, name, again, error);
          if (again) {
            tally.failed++;
            console.log(`not ok - ${name} (${seconds(began)} s)`);
          } else {
            tally.retried++;
            console.log(`retry - ${name}`);
          }
          await workbench.load();
        }
      }
    }
  }
  return tally;
}

async function inTime(run: () => Promise<void>): Promise<void> {
  let timer: NodeJS.Timeout | undefined;
  const late = new Promise<never>((_, reject) => {
    timer = setTimeout(() => reject(new Error(`not done after ${TEST_TIMEOUT / 1000} s`)), TEST_TIMEOUT);
  });
  try {
    await Promise.race([run(), late]);
  } finally {
    clearTimeout(timer);
  }
}

/** Says what failed, with the page's own errors, and keeps a picture. */
async function showFailure(
  workbench: Workbench,
  name: string,
  again: boolean,
  error: unknown,
): Promise<void> {
  console.log(indent(error instanceof Error ? describe(error) : String(error)));
  for (const line of workbench.errors.take()) console.log(indent(`page ${line}`));
  const file = `failed-${name.toLowerCase().replace(/[^a-z0-9]+/g, '-')}${again ? '-2' : ''}`;
  try {
    console.log(indent(`picture: ${await workbench.screenshot(file)}`));
  } catch (problem) {
    console.log(indent(`no picture: ${String(problem)}`));
  }
}

function describe(error: Error): string {
  const cause = error.cause instanceof Error ? `\ncaused by ${describe(error.cause)}` : '';
  return (error.stack ?? error.message) + cause;
}

const indent = (text: string): string => stripVTControlCharacters(text).replace(/^/gm, '    ');
const seconds = (since: number): string => ((performance.now() - since) / 1000).toFixed(1);
