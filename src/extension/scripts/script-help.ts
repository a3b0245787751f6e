import * as vscode from 'vscode';
import { readInstant } from '../instant';
import type { Services } from '../services';
import { commandLink, factLines, trustedMarkdown } from './file-facts';
import { mentionAt, type Mention } from './mentions';
import { fileNamed } from './named-files';
import { thumbnail } from './thumbnail';

/** Scripts, notebooks (their cells are documents of these languages) and notes. */
const SCRIPTS: vscode.DocumentSelector = ['python', 'markdown'].flatMap((language) => [
  { language, scheme: 'file' },
  { language, scheme: 'untitled' },
  { language, scheme: 'vscode-notebook-cell' },
]);

/** Hovers and code actions on data files and GPS times that a script mentions. */
export function scriptHelp(services: Services): vscode.Disposable {
  return vscode.Disposable.from(
    vscode.languages.registerHoverProvider(SCRIPTS, {
      provideHover: async (document, position, token) => {
        const mention = mentionIn(document, position);
        if (!mention) return undefined;
        const text =
          mention.kind === 'gps'
            ? timeHover(mention, document)
            : await fileHover(mention, document, services, token);
        return text && new vscode.Hover(text, rangeOf(mention, position.line));
      },
    }),
    vscode.languages.registerCodeActionsProvider(
      SCRIPTS,
      { provideCodeActions: (document, range) => actions(document, range) },
      { providedCodeActionKinds: [vscode.CodeActionKind.Empty] },
    ),
  );
}

const mentionIn = (document: vscode.TextDocument, at: vscode.Position): Mention | undefined =>
  mentionAt(document.lineAt(at.line).text, at.character);

const rangeOf = (m: Mention, line: number): vscode.Range => new vscode.Range(line, m.from, line, m.to);

function timeHover(mention: Mention, document: vscode.TextDocument): vscode.MarkdownString | undefined {
  const instant = readInstant(mention.text);
  if (!instant) return undefined;
  const text = trustedMarkdown('fringeside.lookAt');
  text.appendText(`GPS ${instant.gps} is ${instant.utc}`);
  if (instant.caution !== undefined) text.appendText(` (${instant.caution})`);
  text.appendMarkdown(
    `\n\n${commandLink('Look there', 'fringeside.lookAt', instant.gps, document.uri.toString())}`,
  );
  return text;
}

async function fileHover(
  mention: Mention,
  document: vscode.TextDocument,
  services: Services,
  token: vscode.CancellationToken,
): Promise<vscode.MarkdownString | undefined> {
  const uri = fileNamed(mention.text, document.uri);
  if (!uri) return undefined;
  const text = trustedMarkdown('fringeside.startLookOn', 'fringeside.openDataViewOf');
  try {
    const description = await services.engine.api.describe({ file: uri.fsPath });
    for (const line of factLines(description)) {
      text.appendText(line);
      text.appendMarkdown('\n\n');
    }
    const picture = token.isCancellationRequested ? undefined : await thumbnail(description, services, token);
    if (picture !== undefined) text.appendMarkdown(`${picture}\n\n`);
  } catch (e) {
    // Whatever ends like a data file but is none says so when it is opened, not while a script is read.
    services.log.debug(`hover on ${uri.fsPath}: ${e instanceof Error ? e.message : String(e)}`);
    return undefined;
  }
  const at = uri.toString();
  text.appendMarkdown(
    `${commandLink('Start a look', 'fringeside.startLookOn', at)} · ${commandLink('Open data view', 'fringeside.openDataViewOf', at)}`,
  );
  return text;
}

function actions(document: vscode.TextDocument, range: vscode.Range): vscode.CodeAction[] {
  const mention = mentionIn(document, range.start);
  if (!mention) return [];
  const action = (title: string, command: string, ...args: unknown[]): vscode.CodeAction => {
    const made = new vscode.CodeAction(title, vscode.CodeActionKind.Empty);
    made.command = { title, command, arguments: args };
    return made;
  };
  if (mention.kind === 'gps') {
    const instant = readInstant(mention.text);
    if (!instant) return [];
    const comment = new vscode.CodeAction(
      `Write ${instant.utc} behind this line`,
      vscode.CodeActionKind.Empty,
    );
    comment.edit = new vscode.WorkspaceEdit();
    comment.edit.insert(
      document.uri,
      document.lineAt(range.start.line).range.end,
      remark(document, instant.utc),
    );
    return [
      action(`Look at GPS ${instant.gps}`, 'fringeside.lookAt', instant.gps, document.uri.toString()),
      comment,
    ];
  }
  const uri = fileNamed(mention.text, document.uri);
  if (!uri) return [];
  return [
    action(`Start a look on ${mention.text}`, 'fringeside.startLookOn', uri.toString()),
    action(`Open data view of ${mention.text}`, 'fringeside.openDataViewOf', uri.toString()),
  ];
}

const remark = ({ languageId }: vscode.TextDocument, utc: string): string =>
  languageId === 'python' ? `  # ${utc}` : ` (${utc})`;
