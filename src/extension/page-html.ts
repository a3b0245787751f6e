import { randomBytes } from 'node:crypto';
import * as vscode from 'vscode';

export type PageName = 'look' | 'data';

/** Content security policy: everything forbidden, then what the page needs, each with its reason. */
function policy(source: string, nonce: string): string {
  return [
    "default-src 'none'",
    // Our own scripts alone, named by a nonce; no eval, no inline handlers. The figure library is loaded with it later.
    `script-src 'nonce-${nonce}'`,
    // The page's style sheet; 'unsafe-inline' because the figure library injects style elements and style attributes.
    `style-src ${source} 'unsafe-inline'`,
    // Maps are drawn into images of our own pixels (data:), saved pictures pass through a blob.
    'img-src data: blob:',
    // The editor's icon-free page uses the editor's fonts, which are system fonts: none are loaded.
    "font-src 'none'",
    // Nothing is fetched, nothing is framed, nothing is posted anywhere.
    "connect-src 'none'",
    "form-action 'none'",
    "base-uri 'none'",
  ].join('; ');
}

/** HTML of a page. The figure library is only named here: the page loads it once its numbers are on screen. */
export function pageHtml(webview: vscode.Webview, dist: vscode.Uri, page: PageName, title: string): string {
  const nonce = randomBytes(18).toString('base64url');
  const uri = (file: string): string => webview.asWebviewUri(vscode.Uri.joinPath(dist, file)).toString();
  return `<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="${policy(webview.cspSource, nonce)}">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${escape(title)}</title>
<link rel="stylesheet" href="${uri(`${page}.css`)}">
</head>
<body data-figure-library="${uri('plotly.js')}">
<div id="page"></div>
<script nonce="${nonce}" src="${uri(`${page}.js`)}"></script>
</body>
</html>`;
}

/** What a webview of ours may do: run scripts, and load files from dist alone. */
export function pageOptions(dist: vscode.Uri): vscode.WebviewOptions {
  return { enableScripts: true, enableForms: false, localResourceRoots: [dist] };
}

function escape(text: string): string {
  return text.replace(/[&<>"]/g, (c) => `&#${c.charCodeAt(0)};`);
}
