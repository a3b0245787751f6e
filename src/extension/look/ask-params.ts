import * as vscode from 'vscode';
import type { StepDescription } from '../../core/protocol/engine';
import { checkParam } from '../../core/protocol/param-check';
import type { Param } from '../../core/steps/define';

/**
 * Asks for the few parameters of a step that matter most, one quick pick after the other; Enter takes the default, Escape
 * gives the whole up (undefined). Only what differs from the default is given back, so recipes stay short.
 */
export async function askParams(step: StepDescription): Promise<Record<string, unknown> | undefined> {
  const asked = Object.entries(step.params).filter(([, p]) => p.ask === true);
  const values: Record<string, unknown> = {};
  for (const [i, [key, param]] of asked.entries()) {
    const title = `${step.title} (${i + 1}/${asked.length}): ${param.label}`;
    const answer = param.kind === 'choice' ? await askChoice(param, title) : await askText(param, title);
    if (answer === undefined) return undefined;
    if (answer.value !== param.default) values[key] = answer.value;
  }
  return values;
}

interface Answer {
  readonly value: unknown;
}

async function askChoice(
  param: Extract<Param, { kind: 'choice' }>,
  title: string,
): Promise<Answer | undefined> {
  const first = [param.default, ...param.choices.filter((c) => c !== param.default)];
  const picked = await vscode.window.showQuickPick(
    first.map((label) => ({ label, ...(label === param.default ? { description: 'default' } : {}) })),
    { title, placeHolder: param.help },
  );
  return picked && { value: picked.label };
}

async function askText(
  param: Exclude<Param, { kind: 'choice' }>,
  title: string,
): Promise<Answer | undefined> {
  const unit = param.kind === 'number' && param.unit !== '' ? ` in ${param.unit}` : '';
  const text = await vscode.window.showInputBox({
    title: `${title}${unit}`,
    prompt: param.help,
    value: param.default === null ? '' : String(param.default),
    placeHolder: param.default === null ? 'leave empty to let the step decide' : '',
    validateInput: (typed) => {
      const check = checkParam(param, valueOf(param, typed));
      return check.ok ? undefined : `${param.label} ${check.message}`;
    },
  });
  return text === undefined ? undefined : { value: valueOf(param, text) };
}

/** What the recipe would hold for the typed text. */
function valueOf(param: Exclude<Param, { kind: 'choice' }>, typed: string): unknown {
  const text = typed.trim();
  if (text === '' && param.default === null) return null;
  switch (param.kind) {
    case 'number':
      return text === '' ? undefined : Number(text);
    case 'flag':
      return /^(true|yes|1)$/i.test(text);
    case 'list':
      return text
        .split(/[\s,;]+/)
        .filter(Boolean)
        .map(Number);
    default:
      return text;
  }
}
