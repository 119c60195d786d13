/** No clock, randomness or host in the solver core and in the add-in's domain. */
import { findForbiddenInDomain, findForbiddenInSolverCore } from './forbidden-names';
import { readSourceFiles } from './source-files';

const inCore = (text: string): string[] => findForbiddenInSolverCore({ path: 'solver-core/a.ts', text });
const inDomain = (text: string): string[] => findForbiddenInDomain({ path: 'addin/domain/a.ts', text });

describe('the solver core', () => {
  it('uses no clock, no randomness, no host and no function whose last bit the language leaves open', () => {
    const files = readSourceFiles('solver-core');
    expect(files.length).toBeGreaterThan(5);
    expect(files.flatMap(findForbiddenInSolverCore)).toEqual([]);
  });

  it.each([
    'const t = Date.now();',
    'const t = new Date();',
    'let t: Date;',
    'performance.now();',
    'setTimeout(go, 0);',
    'Math.random();',
    'Math.log(2);',
    'Math.pow(2, 0.5);',
    'Math.hypot(3, 4);',
    "Math['exp'](1);",
    'const { sin } = Math;',
    'const a = x ** 0.5;',
    'a **= 2;',
    'const a = 10 ** -7;',
    'globalThis.x = 1;',
    'console.log(1);',
    'process.exit();',
    "a.localeCompare('b');",
    "new Intl.NumberFormat('en');",
  ])('would be caught at: %s', (text) => {
    expect(inCore(text)).toHaveLength(1);
  });

  it.each([
    'Math.sqrt(2) + Math.abs(-1) + Math.max(1, 2);',
    'const unit = 2 ** -52;',
    'interface Report { readonly document: string }',
    'const a = report.window;',
    'function f(process: number) { return process; }',
    '// Math.random and Date stand only in a comment',
    "const text = 'new Date()';",
  ])('may say: %s', (text) => {
    expect(inCore(text)).toEqual([]);
  });
});

describe('the domain of the add-in', () => {
  it('uses no clock, no randomness and no host', () => {
    const files = readSourceFiles('addin/domain');
    expect(files.length).toBeGreaterThan(5);
    expect(files.flatMap(findForbiddenInDomain)).toEqual([]);
  });

  it.each(['new Date();', 'Math.random();', 'console.log(1);', 'fetch(x);', 'document.title;'])(
    'would be caught at: %s',
    (text) => {
      expect(inDomain(text)).toHaveLength(1);
    },
  );

  it('may use the logarithm: worksheets have it', () => {
    expect(inDomain('Math.log(2) + 2 ** 0.5;')).toEqual([]);
  });
});
