import { execFileSync } from 'node:child_process';
import { mkdirSync, readFileSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** Folders of one throw-away installation of the editor, and the command line that uses them. */
export interface Profile {
  readonly dir: string;
  readonly workspace: string;
  readonly settingsFile: string;
  /** Settings that tests change: the server watches this file; changes of the user's own file do not reach the page. */
  readonly machineSettingsFile: string;
  readonly command: readonly string[];
  readonly env: NodeJS.ProcessEnv;
}

/** Keeps away whatever may pop up over the workbench or steal its focus, and everything that would call home. */
const quiet: Readonly<Record<string, unknown>> = {
  'workbench.startupEditor': 'none',
  'workbench.tips.enabled': false,
  'workbench.enableExperiments': false,
  'workbench.secondarySideBar.defaultVisibility': 'hidden',
  'security.workspace.trust.enabled': false,
  'telemetry.telemetryLevel': 'off',
  'extensions.autoUpdate': false,
  'extensions.autoCheckUpdates': false,
  'extensions.ignoreRecommendations': true,
  'git.enabled': false,
  'chat.disableAIFeatures': true,
  'explorer.compactFolders': false,
  'window.autoDetectColorScheme': false,
  'window.autoDetectHighContrast': false,
};

/** Makes a fresh profile with the packaged extension installed in it. */
export function prepareProfile(options: {
  readonly dir: string;
  readonly serverDir: string;
  readonly vsix: string;
  readonly theme: string;
  readonly settings?: Readonly<Record<string, unknown>>;
}): Profile {
  const { dir, serverDir, vsix, theme, settings } = options;
  rmSync(dir, { recursive: true, force: true });
  for (const folder of ['user/User', 'user/Machine', 'extensions', 'workspace', 'config', 'server-data'])
    mkdirSync(join(dir, folder), { recursive: true });
  const profile: Profile = {
    dir,
    workspace: join(dir, 'workspace'),
    settingsFile: join(dir, 'user/User/settings.json'),
    machineSettingsFile: join(dir, 'user/Machine/settings.json'),
    command: [
      process.execPath,
      join(serverDir, 'node_modules/code-server/lib/vscode/out/server-main.js'),
      ...['--user-data-dir', join(dir, 'user')],
      ...['--extensions-dir', join(dir, 'extensions')],
      ...['--server-data-dir', join(dir, 'server-data')],
      ...['--accept-server-license-terms', '--telemetry-level', 'off'],
    ],
    env: cleanEnv(dir),
  };
  writeJson(profile.settingsFile, { ...quiet, 'workbench.colorTheme': theme, ...settings });
  writeJson(profile.machineSettingsFile, {});
  const [program, ...args] = profile.command;
  execFileSync(program, [...args, '--install-extension', vsix], { env: profile.env, stdio: 'pipe' });
  return profile;
}

/** Changes settings of a running editor; undefined takes a change back. */
export function changeSettings(profile: Profile, change: Readonly<Record<string, unknown>>): void {
  const file = profile.machineSettingsFile;
  const now = JSON.parse(readFileSync(file, 'utf8')) as Record<string, unknown>;
  writeJson(file, { ...now, ...change });
}

/** The folder of the installed extension inside the profile. */
export function installedExtension(profile: Profile): string {
  const folders = readdirSync(join(profile.dir, 'extensions'), { withFileTypes: true });
  const found = folders.filter((entry) => entry.isDirectory() && !entry.name.startsWith('.'));
  if (found.length !== 1)
    throw new Error(`expected one installed extension, found: ${found.map((f) => f.name).join(', ')}`);
  return join(profile.dir, 'extensions', found[0].name);
}

/** Text of the extension host's logs, all windows joined; empty when there is none yet. */
export function hostLog(profile: Profile): string {
  const logs = join(profile.dir, 'user/logs');
  try {
    return readdirSync(logs, { recursive: true, encoding: 'utf8' })
      .filter((name) => name.endsWith('remoteexthost.log'))
      .map((name) => readFileSync(join(logs, name), 'utf8'))
      .join('\n');
  } catch {
    return '';
  }
}

function writeJson(file: string, settings: Readonly<Record<string, unknown>>): void {
  writeFileSync(file, JSON.stringify(settings, null, 2));
}

/** Inside an editor's terminal VSCODE_* would reach the server under test; the home folder stays untouched. */
function cleanEnv(dir: string): NodeJS.ProcessEnv {
  const kept = Object.entries(process.env).filter(
    ([name]) => !name.startsWith('VSCODE_') && name !== 'NODE_OPTIONS',
  );
  return {
    ...Object.fromEntries(kept),
    XDG_CONFIG_HOME: join(dir, 'config'),
    XDG_DATA_HOME: join(dir, 'config'),
  };
}
