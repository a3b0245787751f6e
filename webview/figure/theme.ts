import type { ThemeKind } from '../../src/core/figures/colours';
import { themeKind } from './theme-kind';

/** Everything a figure takes from the editor's theme. */
export interface Theme {
  readonly kind: ThemeKind;
  readonly text: string;
  readonly muted: string;
  readonly grid: string;
  readonly ground: string;
  readonly font: string;
  readonly fontSize: number;
}

export function readTheme(body: HTMLElement = document.body): Theme {
  const kind = themeKind(body.classList);
  const text = resolved(body, '--vscode-editor-foreground');
  const style = getComputedStyle(body);
  return {
    kind,
    text: rgba(text, 1),
    muted: rgba(resolved(body, '--vscode-descriptionForeground'), 1),
    grid: rgba(text, kind.startsWith('contrast') ? 0.3 : 0.12),
    ground: rgba(resolved(body, '--vscode-editor-background'), 1),
    font: style.fontFamily,
    fontSize: Math.max(11, parseFloat(style.fontSize) - 2),
  };
}

/** A colour of the theme as the browser computes it: red, green, blue, and opacity where it is not 1. */
function resolved(body: HTMLElement, name: string): readonly number[] {
  const probe = document.createElement('span');
  probe.style.color = `var(${name}, currentColor)`;
  body.append(probe);
  const { color } = getComputedStyle(probe);
  probe.remove();
  return (color.match(/[\d.]+/g) ?? ['128', '128', '128']).map(Number);
}

function rgba([r = 0, g = 0, b = 0, a = 1]: readonly number[], opacity: number): string {
  return `rgba(${r}, ${g}, ${b}, ${a * opacity})`;
}

/** Calls back when the editor's theme, its colours or the reduced-motion setting change. */
export function onThemeChange(changed: () => void): () => void {
  const watch = new MutationObserver(changed);
  watch.observe(document.body, { attributes: true, attributeFilter: ['class', 'data-vscode-theme-id'] });
  watch.observe(document.documentElement, { attributes: true, attributeFilter: ['style'] });
  return () => watch.disconnect();
}
