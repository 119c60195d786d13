/** Only the Excel adapter speaks to Excel: everything else of the add-in would run beside any spreadsheet program. */
import ts from 'typescript';
import { forEachNode, parseSourceFile, placeOf, readSourceFiles, type SourceFile } from './source-files';

const libraryGlobals = new Set(['Office', 'OfficeExtension', 'OfficeRuntime', 'Excel']);
const theirRoom = 'addin/adapters/excel-host/';

/** Uses of the library's globals, in types as well; a member or a property of such a name is none. */
function usesOfLibrary(file: SourceFile): string[] {
  const tree = parseSourceFile(file);
  const found: string[] = [];
  forEachNode(tree, (node) => {
    if (!ts.isIdentifier(node) || !libraryGlobals.has(node.text)) return;
    const { parent } = node;
    const isMember =
      (ts.isPropertyAccessExpression(parent) && parent.name === node) ||
      (ts.isQualifiedName(parent) && parent.right === node) ||
      (ts.isPropertyAssignment(parent) && parent.name === node) ||
      (ts.isPropertySignature(parent) && parent.name === node);
    if (!isMember) found.push(placeOf(tree, node));
  });
  return found;
}

it('no file of the add-in names Office or Excel but those of the Excel adapter', () => {
  const files = readSourceFiles('addin');
  const [theirs, others] = [true, false].map((isTheirs) =>
    files.filter(({ path }) => path.startsWith(theirRoom) === isTheirs),
  );
  expect(theirs.flatMap(usesOfLibrary).length).toBeGreaterThan(10);
  expect(others.flatMap(usesOfLibrary)).toEqual([]);
});

it.each([
  ['await Excel.run(work);', 1],
  ['let range: Excel.Range;', 1],
  ['window.Office.onReady();', 0],
  ["const names = { Excel: 'Excel' };", 0],
])('%s', (text, count) => {
  expect(usesOfLibrary({ path: 'addin/a.ts', text })).toHaveLength(count);
});
