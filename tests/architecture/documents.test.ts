/** The documents speak of what is there: files, commands, rules. */
import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { checkoutFolder } from '../support/needs';
import { readSourceFiles } from './source-files';

const documents = [
  'README.md',
  'DEVELOPERS.md',
  'addin/README.md',
  'addin/SPEC.md',
  'solver-core/README.md',
  'solver-core/SPEC.md',
  'manifest/README.md',
];

const readDocument = (document: string): string => readFileSync(path.join(checkoutFolder, document), 'utf8');

const exists = (...parts: readonly string[]): boolean => existsSync(path.join(checkoutFolder, ...parts));

/** Made by the build or by the demo, and so missing in a fresh checkout. */
const isMadeByTools = (file: string): boolean => /^(dist|build)\/|-planned\.xlsx$/.test(file);

describe.each(documents)('%s', (document) => {
  it('links only to files that exist', () => {
    const links = [...readDocument(document).matchAll(/\]\((?!https?:|#)([^)#]+)(#[^)]*)?\)/g)].map(
      ([, link]) => link,
    );
    expect(links.filter((link) => !exists(path.dirname(document), link))).toEqual([]);
  });

  it('names only files and folders that exist', () => {
    // `addin/domain/sheet/cell-range.ts`, `tests/suite`: from the top of the checkout.
    const named = [
      ...readDocument(document).matchAll(/`((?:addin|solver-core|tests|manifest|dist|\.ci)\/[\w./-]*)`/g),
    ];
    const missing = named.map(([, file]) => file).filter((file) => !isMadeByTools(file) && !exists(file));
    expect(missing).toEqual([]);
  });

  it('names only commands that package.json has', () => {
    const { scripts } = JSON.parse(readDocument('package.json')) as { scripts: Record<string, string> };
    const named = [...readDocument(document).matchAll(/npm run ([\w:-]+)/g)].map(([, script]) => script);
    expect(named.filter((script) => !(script in scripts))).toEqual([]);
  });
});

describe('the numbered rules', () => {
  const rulesOf = (document: string): string[] =>
    [...readDocument(document).matchAll(/^\W*\*\*((?:SC|AD)-\d+)/gm)].map(([, rule]) => rule);
  const rules = [...rulesOf('addin/SPEC.md'), ...rulesOf('solver-core/SPEC.md')];

  it('have each a number of their own', () => {
    expect(rules.length).toBeGreaterThan(40);
    expect(rules.filter((rule, position) => rules.indexOf(rule) !== position)).toEqual([]);
  });

  it('exist where a test or a comment cites them', () => {
    const unknown = readSourceFiles('solver-core', 'addin', 'tests').flatMap((file) =>
      [...file.text.matchAll(/\b(?:SC|AD)-\d+/g)]
        .map(([rule]) => rule)
        .filter((rule) => !rules.includes(rule))
        .map((rule) => `${file.path} cites ${rule}`),
    );
    expect([...new Set(unknown)]).toEqual([]);
  });
});
