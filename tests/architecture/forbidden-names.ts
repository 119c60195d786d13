/**
 * Finds clocks, randomness, hosts and inexact mathematics where they may not stand.
 *
 * The solver core gives the same answer on every machine (solver-core/SPEC.md), so it may use nothing that differs
 * between two of them. The language leaves the last bit of Math.log, pow, exp, sin … and of `**` open; square roots
 * and the four operations are exact to the last bit (IEEE 754), and so stay allowed.
 */
import ts from 'typescript';
import { forEachNode, parseSourceFile, placeOf, type SourceFile } from './source-files';

const clocksAndHosts = [
  'Date',
  'performance',
  'setTimeout',
  'setInterval',
  'setImmediate',
  'queueMicrotask',
  'requestAnimationFrame',
  'crypto',
  'process',
  'Buffer',
  'require',
  'window',
  'document',
  'navigator',
  'self',
  'globalThis',
  'localStorage',
  'fetch',
  'console',
  'Worker',
  'Atomics',
  'SharedArrayBuffer',
];

/** Their result hangs on the host's language data, or on when memory is collected. */
const hostDependent = ['Intl', 'WeakRef', 'FinalizationRegistry'];
const hostDependentMethods = ['toLocaleString', 'localeCompare', 'toLocaleUpperCase', 'toLocaleLowerCase'];

/** Whole-number and sign operations, and the square root: exact to the last bit on every machine. */
const exactMathMembers = new Set([
  'abs',
  'ceil',
  'clz32',
  'floor',
  'fround',
  'imul',
  'max',
  'min',
  'round',
  'sign',
  'sqrt',
  'trunc',
]);

/** For solver-core: no clock, randomness, host, or function whose last bit is open. */
export function findForbiddenInSolverCore(file: SourceFile): string[] {
  return findForbidden(file, [...clocksAndHosts, ...hostDependent], (tree, node, report) => {
    if (ts.isIdentifier(node) && node.text === 'Math' && isGlobalUse(node)) {
      const member = ts.isPropertyAccessExpression(node.parent) ? node.parent.name.text : undefined;
      if (member === undefined || !exactMathMembers.has(member)) {
        report(node, member === undefined ? 'Math as a whole' : `Math.${member}`);
      }
    }
    if (ts.isPropertyAccessExpression(node) && hostDependentMethods.includes(node.name.text)) {
      report(node, node.name.text);
    }
    const isPower =
      ts.isBinaryExpression(node) &&
      (node.operatorToken.kind === ts.SyntaxKind.AsteriskAsteriskToken ||
        node.operatorToken.kind === ts.SyntaxKind.AsteriskAsteriskEqualsToken);
    if (isPower && !isPowerOfTwo(node, tree)) {
      report(node, '**');
    }
  });
}

/** For addin/domain: pure; the caller hands in the time, nothing is drawn by lot, nothing reaches a host. */
export function findForbiddenInDomain(file: SourceFile): string[] {
  return findForbidden(file, clocksAndHosts, (_tree, node, report) => {
    if (
      ts.isPropertyAccessExpression(node) &&
      node.expression.getText() === 'Math' &&
      node.name.text === 'random'
    ) {
      report(node, 'Math.random');
    }
  });
}

type Report = (node: ts.Node, what: string) => void;

function findForbidden(
  file: SourceFile,
  globals: readonly string[],
  look: (tree: ts.SourceFile, node: ts.Node, report: Report) => void,
): string[] {
  const tree = parseSourceFile(file);
  const found: string[] = [];
  const declared = namesDeclaredIn(tree);
  const report: Report = (node, what) => found.push(`${placeOf(tree, node)} uses ${what}`);
  forEachNode(tree, (node) => {
    if (
      ts.isIdentifier(node) &&
      globals.includes(node.text) &&
      !declared.has(node.text) &&
      isGlobalUse(node)
    ) {
      report(node, node.text);
    }
    look(tree, node, report);
  });
  return found;
}

/** Not the name of a member, nor of a property in an object or type. */
function isGlobalUse(node: ts.Identifier): boolean {
  const { parent } = node;
  const isMemberName =
    (ts.isPropertyAccessExpression(parent) && parent.name === node) ||
    (ts.isQualifiedName(parent) && parent.right === node) ||
    ((ts.isPropertyAssignment(parent) ||
      ts.isPropertyDeclaration(parent) ||
      ts.isPropertySignature(parent) ||
      ts.isMethodDeclaration(parent) ||
      ts.isMethodSignature(parent)) &&
      parent.name === node);
  return !isMemberName;
}

/** Names that the file gives to things of its own: a parameter called `process` is no host. */
function namesDeclaredIn(tree: ts.SourceFile): Set<string> {
  const names = new Set<string>();
  forEachNode(tree, (node) => {
    const isDeclaration =
      ts.isParameter(node) ||
      ts.isVariableDeclaration(node) ||
      ts.isFunctionDeclaration(node) ||
      ts.isImportSpecifier(node) ||
      ts.isBindingElement(node);
    if (isDeclaration && node.name !== undefined && ts.isIdentifier(node.name)) {
      names.add(node.name.text);
    }
  });
  return names;
}

/** 2 raised to a whole number that stands there in figures: exact everywhere, and how tolerances are written. */
function isPowerOfTwo(node: ts.BinaryExpression, tree: ts.SourceFile): boolean {
  return /^2(\.0)?$/.test(node.left.getText(tree)) && /^-?\d+$/.test(node.right.getText(tree));
}
