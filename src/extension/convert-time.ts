import * as vscode from 'vscode';
import { readInstant } from './instant';

/** Converts while the user types; picking a line copies it. */
export function convertTime(): void {
  const pick = vscode.window.createQuickPick<vscode.QuickPickItem & { readonly value?: string }>();
  pick.title = 'Convert GPS/UTC time';
  pick.placeholder = 'GPS seconds such as 1400000000.25, or UTC such as 2024-05-18T16:53:02';
  const show = (text: string): void => {
    const instant = readInstant(text);
    if (instant) {
      const { from, gps, utc, caution } = instant;
      const note = caution === undefined ? {} : { detail: caution };
      const items = [
        { label: gps, description: 'GPS seconds: Enter copies', alwaysShow: true, value: gps, ...note },
        { label: utc, description: 'UTC: Enter copies', alwaysShow: true, value: utc, ...note },
      ];
      // First the scale that was asked for, which is the other one.
      pick.items = from === 'gps' ? items.reverse() : items;
    } else if (text.trim() === '') pick.items = [];
    else pick.items = [{ label: `"${text}" is neither GPS seconds nor a UTC date`, alwaysShow: true }];
  };
  pick.onDidChangeValue(show);
  pick.onDidAccept(() => {
    const value = pick.selectedItems[0]?.value;
    if (value === undefined) return;
    void vscode.env.clipboard.writeText(value);
    vscode.window.setStatusBarMessage(`Copied ${value}`, 3000);
    pick.hide();
  });
  pick.onDidHide(() => pick.dispose());
  pick.show();
}
