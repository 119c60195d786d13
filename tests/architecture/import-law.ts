/**
 * Judges the imports of source files by the law in allowed-imports.ts.
 */
import { posix } from 'node:path';
import ts from 'typescript';
import { coreDoor, rooms, type Room } from './allowed-imports';
import { forEachNode, parseSourceFile, placeOf, type SourceFile } from './source-files';

interface Import {
  /** What stands in quotes. */
  readonly specifier: string;
  /** Nothing of it exists at run time. */
  readonly isTypeOnly: boolean;
  readonly place: string;
}

/** Sentences about each import that the law does not allow, in the order of the files. */
export function findForbiddenImports(files: readonly SourceFile[]): string[] {
  return files.flatMap((file) => {
    const room = roomOf(file.path);
    if (room === undefined) {
      return [
        `${file.path} stands in no room of tests/architecture/allowed-imports.ts; give its folder an entry.`,
      ];
    }
    return importsOf(file)
      .map((found) => judge(file, room, found))
      .filter((sentence) => sentence !== undefined);
  });
}

/** The most particular entry that covers the file. */
function roomOf(file: string): Room | undefined {
  return rooms
    .filter((room) => isWithin(file, room.path))
    .reduce<Room | undefined>(
      (best, room) => (best === undefined || room.path.length > best.path.length ? room : best),
      undefined,
    );
}

function isWithin(file: string, folderOrFile: string): boolean {
  return file === folderOrFile || file.startsWith(`${folderOrFile}/`);
}

function judge(file: SourceFile, room: Room, found: Import): string | undefined {
  const { specifier } = found;
  const deny = (what: string): string => `${found.place} imports ${what}. ${allowanceOf(room)}`;
  if (specifier === coreDoor) {
    return mayReach(room, coreDoor, found.isTypeOnly) ? undefined : deny(coreDoor);
  }
  if (specifier.startsWith('.')) {
    const target = posix.normalize(posix.join(posix.dirname(file.path), specifier));
    if (file.path.startsWith('addin/') && isWithin(target, 'solver-core')) {
      return deny(`${target} past the door: the add-in reaches the solver core as ${coreDoor}`);
    }
    const isOwnRoom = roomOf(`${target}.ts`)?.path === room.path;
    return isOwnRoom || mayReach(room, target, found.isTypeOnly) ? undefined : deny(target);
  }
  if (specifier.startsWith('node:') || ts.isExternalModuleNameRelative(specifier)) {
    return room.mayUseNode === true ? undefined : deny(specifier);
  }
  const isAllowedPackage = (room.packages ?? []).some((name) => isWithin(specifier, name));
  return isAllowedPackage ? undefined : deny(`the package ${specifier}`);
}

function mayReach(room: Room, target: string, isTypeOnly: boolean): boolean {
  const folders = isTypeOnly ? [...room.mayImport, ...(room.mayImportTypesOf ?? [])] : room.mayImport;
  return folders.some((folder) => isWithin(target, folder));
}

/** `addin/ports may import: addin/domain; types of #solver-core.` */
function allowanceOf(room: Room): string {
  const parts = [
    room.mayImport.join(', '),
    room.mayImportTypesOf === undefined ? '' : `types of ${room.mayImportTypesOf.join(', ')}`,
    room.packages === undefined ? '' : `the packages ${room.packages.join(', ')}`,
    room.mayUseNode === true ? "Node's modules" : '',
  ].filter((part) => part !== '');
  return `${room.path} may import: ${parts.length === 0 ? 'nothing outside itself' : parts.join('; ')}.`;
}

function importsOf(file: SourceFile): Import[] {
  const tree = parseSourceFile(file);
  const imports: Import[] = [];
  const add = (specifier: ts.Node | undefined, isTypeOnly: boolean): void => {
    if (specifier !== undefined && ts.isStringLiteralLike(specifier)) {
      imports.push({ specifier: specifier.text, isTypeOnly, place: placeOf(tree, specifier) });
    }
  };
  forEachNode(tree, (node) => {
    if (ts.isImportDeclaration(node)) {
      add(node.moduleSpecifier, importsOnlyTypes(node));
    } else if (ts.isExportDeclaration(node)) {
      add(node.moduleSpecifier, exportsOnlyTypes(node));
    } else if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) {
      add(node.argument.literal, true);
    } else if (ts.isImportEqualsDeclaration(node) && ts.isExternalModuleReference(node.moduleReference)) {
      add(node.moduleReference.expression, node.isTypeOnly);
    } else if (ts.isCallExpression(node) && isImportCall(node)) {
      add(node.arguments[0], false);
    } else if (
      ts.isNewExpression(node) &&
      node.expression.getText(tree) === 'URL' &&
      isModuleUrl(node, tree)
    ) {
      // new URL('./solver-worker.ts', import.meta.url): how a bundler is told of a worker's entry.
      add(node.arguments?.[0], false);
    }
  });
  return imports.map((found) => ({ ...found, specifier: found.specifier.replace(/\.tsx?$/, '') }));
}

function importsOnlyTypes(node: ts.ImportDeclaration): boolean {
  const clause = node.importClause;
  if (clause === undefined) {
    return false;
  }
  const bindings = clause.namedBindings;
  return (
    clause.phaseModifier === ts.SyntaxKind.TypeKeyword ||
    (clause.name === undefined &&
      bindings !== undefined &&
      ts.isNamedImports(bindings) &&
      bindings.elements.length > 0 &&
      bindings.elements.every((element) => element.isTypeOnly))
  );
}

function exportsOnlyTypes(node: ts.ExportDeclaration): boolean {
  const clause = node.exportClause;
  return (
    node.isTypeOnly ||
    (clause !== undefined &&
      ts.isNamedExports(clause) &&
      clause.elements.every((element) => element.isTypeOnly))
  );
}

function isImportCall(node: ts.CallExpression): boolean {
  return (
    node.expression.kind === ts.SyntaxKind.ImportKeyword ||
    (ts.isIdentifier(node.expression) && node.expression.text === 'require')
  );
}

function isModuleUrl(node: ts.NewExpression, tree: ts.SourceFile): boolean {
  return node.arguments?.[1]?.getText(tree) === 'import.meta.url';
}
