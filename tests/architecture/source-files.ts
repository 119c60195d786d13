/**
 * Reads the project's source files for the tests that hold its architecture.
 */
import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import ts from 'typescript';
import { checkoutFolder } from '../support/needs';

export interface SourceFile {
  /** From the top of the checkout, `/` between. */
  readonly path: string;
  readonly text: string;
}

/** Every .ts and .tsx file under the folders, in the order of their paths. */
export function readSourceFiles(...folders: readonly string[]): SourceFile[] {
  return folders
    .flatMap((folder) =>
      readdirSync(path.join(checkoutFolder, folder), { recursive: true, withFileTypes: true })
        .filter((entry) => entry.isFile() && /\.tsx?$/.test(entry.name))
        .map((entry) => path.relative(checkoutFolder, path.join(entry.parentPath, entry.name))),
    )
    .map((file) => file.split(path.sep).join('/'))
    .sort()
    .map((file) => ({ path: file, text: readFileSync(path.join(checkoutFolder, file), 'utf8') }));
}

/** Its syntax tree, with parents. */
export function parseSourceFile(file: SourceFile): ts.SourceFile {
  return ts.createSourceFile(file.path, file.text, ts.ScriptTarget.ES2022, true);
}

/** `file.ts:12`, the way an editor opens it. */
export function placeOf(tree: ts.SourceFile, node: ts.Node): string {
  return `${tree.fileName}:${tree.getLineAndCharacterOfPosition(node.getStart(tree)).line + 1}`;
}

/** Calls `visit` for each node of a tree, parents first. */
export function forEachNode(node: ts.Node, visit: (node: ts.Node) => void): void {
  visit(node);
  node.forEachChild((child) => forEachNode(child, visit));
}
