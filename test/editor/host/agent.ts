import assert from 'node:assert/strict';
import { join } from 'node:path';
import * as vscode from 'vscode';
import { folder, written, type HostTests } from './api';

const NAMES = ['overview', 'noise', 'map', 'match', 'runRecipe'].map((n) => `fringeside_${n}`);

async function ask(name: string, input: object): Promise<string> {
  const result = await vscode.lm.invokeTool(
    name,
    { input, toolInvocationToken: undefined },
    new vscode.CancellationTokenSource().token,
  );
  return result.content
    .map((part) => (part instanceof vscode.LanguageModelTextPart ? part.value : ''))
    .join('');
}

/** The tools that agents may use. */
export const agentTests: HostTests = {
  'five tools are offered, and each answers with numbers, units and the caution': async () => {
    const offered = vscode.lm.tools.map((t) => t.name).filter((n) => n.startsWith('fringeside_'));
    assert.deepEqual([...offered].sort(), [...NAMES].sort());
    const file = join(folder(), 'birch.h5');
    const short = { file, start: '1400000080', duration: 64 };
    assert.match(await ask('fringeside_overview', short), /4096 Hz/);
    const noise = await ask('fringeside_noise', { ...short, segment: 2 });
    assert.match(noise, /strain\/√Hz/);
    assert.match(noise, /not a detection statement/);
    assert.match(await ask('fringeside_map', short), /Q/);
    assert.match(await ask('fringeside_match', { ...short, mass1: 14.6, mass2: 10.9 }), /SNR/);
    await written(
      'tool.fringe.json',
      '{"fringe":1,"inputs":{"b":{"file":"birch.h5"}},"steps":[{"id":"look","do":"overview","of":["b"]}]}',
    );
    assert.match(
      await ask('fringeside_runRecipe', { recipe: join(folder(), 'tool.fringe.json') }),
      /4096 Hz/,
    );
  },

  'a file outside of the workspace is refused': async () => {
    await assert.rejects(ask('fringeside_overview', { file: '/etc/hostname' }), /workspace/);
  },
};
