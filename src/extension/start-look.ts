import { basename, dirname, extname, join, relative } from 'node:path';
import * as vscode from 'vscode';
import { addSeconds, formatGps, parseGps } from '../core/data/gps-time';
import type { FileDescription } from '../core/protocol/engine';
import type { ChannelAnswers } from '../core/protocol/panel';
import { editRecipe, freshId } from '../core/recipe/edit';
import { applyEdits } from 'jsonc-parser';
import { inputName, startingRecipe } from '../core/recipe/starting-recipe';
import type { ChannelFacts } from '../core/formats/format';
import { LOOK_VIEW, RECIPE_ENDING } from './look/documents';
import type { Services } from './services';

/** What a look begins with: a channel of a file, what the user said about it, and which part of it. */
export interface LookStart {
  readonly file: string;
  readonly channel: ChannelFacts;
  readonly answers: ChannelAnswers;
  /** Seconds after the first sample. */
  readonly span?: readonly [from: number, to: number];
}

/** Text of the recipe for one or more channels; each further one gets its own input and the same first steps. */
export function lookText(starts: readonly [LookStart, ...LookStart[]], folder: string): string {
  const [first, ...others] = starts;
  const path = (s: LookStart): string => relative(folder, s.file).replaceAll('\\', '/');
  let text = startingRecipe(path(first), first.channel, first.answers);
  const edit = (e: Parameters<typeof editRecipe>[1]): void => {
    text = applyEdits(text, editRecipe(text, e));
  };
  const names = [inputName(first.file)];
  const narrow = (name: string, s: LookStart): void => {
    const values = spanValues(s);
    if (values) edit({ op: 'input', input: name, values });
  };
  narrow(names[0], first);
  for (const other of others) {
    const name = freshId(inputName(other.file), [...names, 'overview', 'noise']);
    names.push(name);
    edit({
      op: 'input',
      input: name,
      values: { file: path(other), channel: other.channel.name, ...other.answers },
    });
    narrow(name, other);
    edit({ op: 'add', step: { id: `overview-${name}`, do: 'overview', of: [name] } });
    edit({ op: 'add', step: { id: `noise-${name}`, do: 'noise-spectrum', of: [name] } });
  }
  return text;
}

/** `start` and `duration` of an input for a span; a channel without a known start counts from GPS 0. */
function spanValues({ channel, answers, span }: LookStart): Record<string, unknown> | undefined {
  if (!span) return undefined;
  const epoch = answers.epoch === undefined ? channel.start?.value : parseGps(answers.epoch);
  const from = Math.max(0, span[0]);
  return {
    start: formatGps(addSeconds(epoch ?? parseGps(0), from)),
    duration: Number((span[1] - from).toPrecision(9)),
  };
}

/** Opens an unsaved recipe beside the first data file, under the first name that is not taken. */
export async function openLook(
  starts: readonly [LookStart, ...LookStart[]],
  services: Services,
  /** Further steps for the recipe's text. */
  more: (text: string) => string = (text) => text,
): Promise<vscode.Uri> {
  const file = starts[0].file;
  const folder = dirname(file);
  const uri = await freeName(folder, stem(file));
  const document = await vscode.workspace.openTextDocument(uri);
  const edit = new vscode.WorkspaceEdit();
  edit.insert(uri, new vscode.Position(0, 0), more(lookText(starts, folder)));
  await vscode.workspace.applyEdit(edit);
  services.log.info(`new look ${basename(document.uri.fsPath)} on ${starts.map((s) => s.file).join(', ')}`);
  await vscode.commands.executeCommand('vscode.openWith', uri, LOOK_VIEW);
  return uri;
}

/** An untitled document beside the data file, named after it: `alder.fringe.json`, `alder-2.fringe.json`, … */
async function freeName(folder: string, name: string): Promise<vscode.Uri> {
  for (let n = 1; ; n++) {
    const path = join(folder, `${name}${n === 1 ? '' : `-${n}`}${RECIPE_ENDING}`);
    const onDisk = vscode.Uri.file(path);
    const untitled = onDisk.with({ scheme: 'untitled' });
    const open = vscode.workspace.textDocuments.some((d) => d.uri.toString() === untitled.toString());
    if (!open && !(await exists(onDisk))) return untitled;
  }
}

function stem(file: string): string {
  let name = basename(file).replace(/\.gz$/i, '');
  name = name.slice(0, name.length - extname(name).length);
  return name === '' ? 'look' : name;
}

async function exists(uri: vscode.Uri): Promise<boolean> {
  try {
    await vscode.workspace.fs.stat(uri);
    return true;
  } catch {
    return false;
  }
}

/** Starts a look on data files named in the Explorer or the palette, asking only for what the files do not say. */
export async function startLookOn(
  files: readonly vscode.Uri[],
  services: Services,
  more?: (text: string) => string,
): Promise<void> {
  const starts: LookStart[] = [];
  for (const uri of files) {
    const description = await services.engine.api.describe({ file: uri.fsPath });
    const channel = await pickChannel(description);
    if (!channel) return;
    const answers = channel.rate ? {} : await askRate(channel);
    if (!answers) return;
    starts.push({ file: uri.fsPath, channel, answers });
  }
  const first = starts.shift();
  if (first !== undefined) await openLook([first, ...starts], services, more);
}

async function pickChannel(description: FileDescription): Promise<ChannelFacts | undefined> {
  const { channels, file } = description;
  if (channels.length === 0) {
    void vscode.window.showErrorMessage(
      `${basename(file)} holds no series of samples. Open its data view to see what is in it.`,
    );
    return undefined;
  }
  if (channels.length === 1) return channels[0];
  const picked = await vscode.window.showQuickPick(
    channels.map((channel) => ({
      label: channel.name,
      description: `${channel.length} samples${channel.rate ? ` at ${channel.rate.value} Hz` : ', rate unknown'}`,
      detail: [channel.type, channel.unit?.value].filter(Boolean).join(', '),
      channel,
    })),
    { title: `Channel of ${basename(file)}`, placeHolder: 'Which channel do you want to look at?' },
  );
  return picked?.channel;
}

async function askRate(channel: ChannelFacts): Promise<ChannelAnswers | undefined> {
  const text = await vscode.window.showInputBox({
    title: `Sample rate of ${channel.name} in Hz`,
    prompt: 'The file does not say it. The answer is written into the recipe.',
    placeHolder: '4096',
    validateInput: (t) =>
      Number(t) > 0 && Number.isFinite(Number(t)) ? undefined : 'a number of Hz above 0, for example 4096',
  });
  return text === undefined ? undefined : { rate: Number(text) };
}
