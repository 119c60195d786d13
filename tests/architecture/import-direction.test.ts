/** Dependencies point one way; the law stands in allowed-imports.ts. */
import ts from 'typescript';
import { compositionRoots, rooms } from './allowed-imports';
import { findForbiddenImports } from './import-law';
import { forEachNode, parseSourceFile, placeOf, readSourceFiles, type SourceFile } from './source-files';

const sourceFiles = readSourceFiles('solver-core', 'addin');

const judgeOne = (path: string, text: string): string[] => findForbiddenImports([{ path, text }]);

describe('the project’s own files', () => {
  it('import only what their room may', () => {
    expect(sourceFiles.length).toBeGreaterThan(10);
    expect(findForbiddenImports(sourceFiles)).toEqual([]);
  });

  it('name Office and Excel as objects of the host only in adapters/excel-host', () => {
    expect(sourceFiles.flatMap(findHostNames)).toEqual([]);
  });
});

describe('the law', () => {
  it.each([
    ['a room below that imports one above', 'addin/domain/sheet/a.ts', `import { x } from '../formula/b';`],
    [
      'the core that imports the add-in',
      'solver-core/sparse/a.ts',
      `import type { X } from '../../addin/ports/x';`,
    ],
    ['the add-in past the door', 'addin/worker/a.ts', `import { x } from '../../solver-core/simplex/b';`],
    ['a value where only types may come', 'addin/ports/a.ts', `import { solve } from '#solver-core';`],
    ['a value beside a type', 'addin/ports/a.ts', `import { type T, solve } from '#solver-core';`],
    ['one adapter that imports another', 'addin/adapters/memory/a.ts', `import { x } from '../xlsx-file/b';`],
    [
      'a face that constructs an adapter itself',
      'addin/pane/a.ts',
      `import { x } from '../adapters/memory/b';`,
    ],
    ['Node in the domain', 'addin/domain/formula/a.ts', `import fs from 'node:fs';`],
    ['Node without its prefix', 'addin/domain/formula/a.ts', `import fs from 'fs';`],
    ['Node in the .xlsx adapter', 'addin/adapters/xlsx-file/a.ts', `import fs from 'node:fs';`],
    ['a package in the wrong room', 'addin/domain/sheet/a.ts', `import { f } from '@borgar/fx/xlsx';`],
    ['any package in the core', 'solver-core/numerics/a.ts', `import x from 'saxes';`],
    ['a re-export', 'solver-core/numerics/a.ts', `export { x } from '../sparse/b';`],
    ['a re-export of everything', 'solver-core/numerics/a.ts', `export * from '../sparse/b';`],
    ['an import in a type', 'solver-core/numerics/a.ts', `type T = import('../sparse/b').B;`],
    ['an import while running', 'solver-core/numerics/a.ts', `const b = await import('../sparse/b');`],
    ['a worker’s entry', 'addin/pane/a.ts', `new Worker(new URL('../worker/w.ts', import.meta.url));`],
    [
      'factorization that sees the problem',
      'solver-core/factorization/a.ts',
      `import { x } from '../linear-program/b';`,
    ],
    [
      'verification that sees the simplex',
      'solver-core/verification/a.ts',
      `import { x } from '../simplex/b';`,
    ],
    ['a folder without an entry', 'addin/cellar/a.ts', ``],
  ])('finds %s', (_what, path, text) => {
    expect(judgeOne(path, text)).toHaveLength(1);
  });

  it.each([
    ['from the same room', 'addin/domain/sheet/a.ts', `import { x } from './b';`],
    ['from a folder within the room', 'solver-core/presolve/a.ts', `import { x } from './reductions/b';`],
    [
      'back from a folder within the room',
      'solver-core/presolve/reductions/a.ts',
      `import { x } from '../b';`,
    ],
    ['downwards', 'addin/use-cases/a.ts', `import { x } from '../domain/sheet/b';`],
    ['types where only types may come', 'addin/ports/a.ts', `import type { T } from '#solver-core';`],
    ['inline types where only types may come', 'addin/ports/a.ts', `import { type T } from '#solver-core';`],
    [
      'an adapter in a composition root',
      'addin/command-line/planrow.ts',
      `import { x } from '../adapters/memory/b';`,
    ],
    [
      'its own face in a composition root',
      'addin/command-line/planrow.ts',
      `import { x } from './arguments';`,
    ],
    [
      'Node in the one file for disks',
      'addin/adapters/xlsx-file/file-on-disk.ts',
      `import fs from 'node:fs';`,
    ],
    ['a package by one of its entries', 'addin/domain/formula/a.ts', `import { f } from '@borgar/fx/xlsx';`],
    ['a specifier that only stands in a comment', 'solver-core/numerics/a.ts', `// import x from 'saxes';`],
  ])('lets pass %s', (_what, path, text) => {
    expect(judgeOne(path, text)).toEqual([]);
  });

  it('says what is allowed instead', () => {
    expect(judgeOne('addin/ports/a.ts', `import { x } from '../use-cases/b';`)).toEqual([
      'addin/ports/a.ts:1 imports addin/use-cases/b. addin/ports may import: addin/domain; types of #solver-core.',
    ]);
  });

  it('has one entry a room, and no room reaches back to one that reaches it', () => {
    expect(new Set(rooms.map((room) => room.path)).size).toBe(rooms.length);
    const folders = rooms.filter((room) => !room.path.endsWith('.ts'));
    const reaches = (from: string, to: string): boolean =>
      folders
        .filter((room) => room.path === from)
        .some((room) => [...room.mayImport, ...(room.mayImportTypesOf ?? [])].includes(to));
    const bothWays = folders.flatMap((a) =>
      folders
        .filter((b) => a.path < b.path && reaches(a.path, b.path) && reaches(b.path, a.path))
        .map((b) => `${a.path} and ${b.path}`),
    );
    expect(bothWays).toEqual([]);
  });

  it('lets only composition roots reach adapters from outside', () => {
    const reachAdapters = rooms
      .filter((room) => !room.path.startsWith('addin/adapters/'))
      .filter((room) => room.mayImport.some((folder) => folder.startsWith('addin/adapters')))
      .map((room) => room.path);
    expect(reachAdapters).toEqual(compositionRoots);
  });

  it('finds a host object named outside its adapter', () => {
    const hostNames = (path: string) => findHostNames({ path, text: 'await Excel.run(async () => Office);' });
    expect(hostNames('addin/pane/a.ts')).toHaveLength(2);
    expect(hostNames('addin/adapters/excel-host/a.ts')).toEqual([]);
    expect(findHostNames({ path: 'addin/pane/a.ts', text: '/** In Excel. */ const a = "Office";' })).toEqual(
      [],
    );
  });
});

/** Identifiers of the Office host outside addin/adapters/excel-host; comments and texts may name it. */
function findHostNames(file: SourceFile): string[] {
  if (file.path.startsWith('addin/adapters/excel-host/')) {
    return [];
  }
  const tree = parseSourceFile(file);
  const found: string[] = [];
  forEachNode(tree, (node) => {
    if (ts.isIdentifier(node) && /^(Office|Excel|OfficeExtension|OfficeRuntime)$/.test(node.text)) {
      found.push(`${placeOf(tree, node)} names ${node.text}; only addin/adapters/excel-host may.`);
    }
  });
  return found;
}
