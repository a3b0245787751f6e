import type { ThemeKind } from '../../src/core/figures/colours';

/** Kind of theme from the classes the editor puts on the body. */
export function themeKind(classes: Iterable<string>): ThemeKind {
  const has = new Set(classes);
  if (has.has('vscode-high-contrast-light')) return 'contrast-light';
  if (has.has('vscode-high-contrast')) return 'contrast-dark';
  return has.has('vscode-light') ? 'light' : 'dark';
}
