import { dirname } from 'node:path';
import * as vscode from 'vscode';
import { editRecipe, type RecipeEdit } from '../../core/recipe/edit';

export const LOOK_VIEW = 'fringeside.look';
export const RECIPE_ENDING = '.fringe.json';

export function isRecipe(uri: vscode.Uri): boolean {
  return uri.path.endsWith(RECIPE_ENDING);
}

/** Folder that a recipe's paths are relative to; an unsaved document has the path it will be saved at. */
export function recipeFolder(uri: vscode.Uri): string {
  if (uri.fsPath.includes('/') || uri.fsPath.includes('\\')) return dirname(uri.fsPath);
  return vscode.workspace.workspaceFolders?.[0]?.uri.fsPath ?? process.cwd();
}

/** Carries an edit of the recipe out in its document, where it can be undone. Tells the user when it cannot. */
export async function applyRecipeEdit(document: vscode.TextDocument, edit: RecipeEdit): Promise<boolean> {
  try {
    const changes = editRecipe(document.getText(), edit);
    if (changes.length === 0) return true;
    const all = new vscode.WorkspaceEdit();
    for (const { offset, length, content } of changes) {
      const range = new vscode.Range(document.positionAt(offset), document.positionAt(offset + length));
      all.replace(document.uri, range, content);
    }
    return await vscode.workspace.applyEdit(all);
  } catch (e) {
    void vscode.window.showWarningMessage(
      `The recipe was not changed: ${e instanceof Error ? e.message : String(e)}`,
    );
    return false;
  }
}
