/** The house: what stands at its top, and how files are named. */
import { existsSync, readdirSync } from 'node:fs';
import path from 'node:path';
import { checkoutFolder } from '../support/needs';
import { readSourceFiles } from './source-files';

const house = [
  'addin',
  'solver-core',
  'manifest',
  'tests',
  'package.json',
  'webpack.config.js',
  'README.md',
  'DEVELOPERS.md',
];

/** Files that tools insist on finding at the top. */
const toolFiles = [
  '.ci',
  '.gitignore',
  '.npmrc',
  '.prettierignore',
  '.prettierrc.json',
  'LICENSE',
  'eslint.config.js',
  'jest.config.js',
  'package-lock.json',
  'tsconfig.base.json',
  'tsconfig.json',
];

/** Made by tools, and never committed (.gitignore). */
const madeByTools = ['.git', 'node_modules', 'dist', 'build', '.DS_Store'];

describe('the top level', () => {
  it('holds the house and the files that tools insist on, and nothing else', () => {
    const strangers = readdirSync(checkoutFolder).filter(
      (entry) => ![...house, ...toolFiles, ...madeByTools].includes(entry),
    );
    expect(strangers).toEqual([]);
  });

  it('is complete', () => {
    const missing = [...house, ...toolFiles].filter((entry) => !existsSync(path.join(checkoutFolder, entry)));
    expect(missing).toEqual([]);
  });
});

describe('source files', () => {
  const files = readSourceFiles('solver-core', 'addin', 'tests');

  it('are named in kebab-case, components in PascalCase', () => {
    const misnamed = files
      .map((file) => file.path)
      .filter(
        (file) => !/^([a-z0-9-]+\/)+([a-z0-9-]+(\.(test|d))?\.tsx?|[A-Z][A-Za-z0-9]*\.tsx)$/.test(file),
      );
    expect(misnamed).toEqual([]);
  });

  it('have no name that says nothing', () => {
    const empty = files
      .map((file) => file.path)
      .filter((file) => /(^|[/-])(utils?|helpers?|common|manager|misc)([/.-]|$)/.test(file));
    expect(empty).toEqual([]);
  });

  it('begin with a comment that says what they are for', () => {
    const bare = files
      .filter((file) => !file.path.startsWith('tests/') && !startsWithComment(file.text))
      .map((file) => file.path);
    expect(bare).toEqual([]);
  });

  it('have at most 500 lines, or say in their header why they are one thing', () => {
    const long = readSourceFiles('solver-core', 'addin').filter((file) => file.text.split('\n').length > 501);
    const unexplained = long.filter(
      (file) => !/\bone (thing|file|class|loop|function|table)\b/i.test(headerOf(file.text)),
    );
    expect(unexplained.map((file) => file.path)).toEqual([]);
  });
});

/** A line for the compiler may stand before it. */
function startsWithComment(text: string): boolean {
  return /^(\/\/\/ <reference [^\n]*\n)*\/\*\*/.test(text);
}

function headerOf(text: string): string {
  return text.slice(0, text.indexOf('*/'));
}
