/**
 * The folder that is served: small enough, without eval, and complete. Built by `npm run build`,
 * which `npm test` runs first.
 */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { gzipSync } from 'node:zlib';

import { bundleFolder } from './pane-in-browser';

const read = (file: string): string => readFileSync(path.join(bundleFolder, file), 'utf8');
const scripts = (): string[] => readdirSync(bundleFolder).filter((file) => file.endsWith('.js'));

it('takes less than 300 kB packed, worker included, without the library of the spreadsheet program', () => {
  const packed = scripts().map((file) => gzipSync(read(file), { level: 9 }).length);
  const page = gzipSync(read('pane.html') + read('page.css')).length;
  expect(packed.length).toBeGreaterThan(2);
  expect(packed.reduce((sum, bytes) => sum + bytes, page)).toBeLessThan(300_000);
});

it('holds no eval, and asks for no scripts but its own and the one from Microsoft', () => {
  const evaluating = scripts().filter((file) => /\beval\(|\bFunction\(["'`]/.test(read(file)));
  expect(evaluating).toEqual([]);
  const sources = [...read('pane.html').matchAll(/<script[^>]*src="?([^"\s>]+)/g)].map(
    ([, source]) => source,
  );
  const foreign = sources.filter((source) => /^https?:/.test(source));
  expect(foreign).toEqual(['https://appsforoffice.microsoft.com/lib/1/hosted/office.js']);
  expect(
    sources
      .filter((source) => !foreign.includes(source))
      .every((s) => existsSync(path.join(bundleFolder, s))),
  ).toBe(true);
  expect(read('pane.html')).not.toMatch(/<script(?![^>]*src=)|\son\w+=/);
});

it('forbids by its policy whatever it does not need', () => {
  for (const file of ['pane.html', 'support.html', 'privacy.html']) {
    const policy = /http-equiv="?Content-Security-Policy"?\s+content="([^"]+)"/.exec(
      read(file).replace(/\s+/g, ' '),
    );
    expect(policy?.[1]).toMatch(/default-src 'self'/);
    expect(policy?.[1]).not.toMatch(/unsafe-eval|script-src[^;]*unsafe-inline|\*/);
  }
});
