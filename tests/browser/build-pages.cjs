/**
 * Builds the pane's test page with the pane's own build: another entry, and a page without the spreadsheet program's
 * library. Usage: node build-pages.cjs FOLDER
 */
const { readFileSync } = require('node:fs');
const path = require('node:path');
const webpack = require('webpack');
const HtmlPlugin = require('html-webpack-plugin');

const root = path.join(__dirname, '..', '..');
const folder = process.argv[2];

import('../../webpack.config.js').then(({ default: builds }) => {
  const pane = builds({}, { mode: 'production' }).find(({ name }) => name === 'pane');
  const html = readFileSync(path.join(root, 'addin', 'pane', 'pane.html'), 'utf8').replace(
    /\s*<script src="https:[^>]*><\/script>/,
    '',
  );
  const config = {
    ...pane,
    context: root,
    entry: { memory: './tests/browser/pages/memory-page.ts' },
    output: { ...pane.output, path: folder },
    plugins: pane.plugins.map((plugin) =>
      plugin instanceof HtmlPlugin
        ? new HtmlPlugin({ filename: 'memory.html', templateContent: html, scriptLoading: 'defer' })
        : plugin,
    ),
  };
  webpack(config, (error, stats) => {
    if (error !== null || stats.hasErrors()) {
      console.error(error ?? stats.toString('errors-only'));
      process.exitCode = 1;
    }
  });
});
