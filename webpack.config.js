import path from 'node:path';
import { fileURLToPath } from 'node:url';
import webpack from 'webpack';

const root = path.dirname(fileURLToPath(import.meta.url));
const output = path.join(root, 'dist');

const shared = {
  resolve: { extensions: ['.ts', '.tsx', '.js', '.mjs'] },
  module: {
    rules: [
      {
        test: /\.tsx?$/,
        exclude: /node_modules/,
        // Types are checked by `npm run types`; here ts-loader only translates, which keeps the build short.
        use: {
          loader: 'ts-loader',
          options: {
            transpileOnly: true,
            configFile: path.join(root, 'tsconfig.base.json'),
            compilerOptions: {
              composite: false,
              declaration: false,
              emitDeclarationOnly: false,
              jsx: 'react-jsx',
            },
          },
        },
      },
    ],
  },
  devtool: false,
  performance: { hints: false },
  stats: 'errors-warnings',
};

/** An ES module for Node or any other host; names are kept so that stack traces can be read. */
const moduleOutput = (filename, library) => ({
  path: output,
  filename,
  module: true,
  chunkFormat: 'module',
  ...(library ? { library: { type: 'module' } } : {}),
});

export default (_env, argv) => {
  const mode = argv.mode ?? 'production';
  return [
    {
      ...shared,
      name: 'solver-core',
      mode,
      target: 'es2022',
      entry: './solver-core/index.ts',
      experiments: { outputModule: true },
      output: moduleOutput('solver-core.mjs', true),
      optimization: { minimize: false },
    },
    {
      ...shared,
      name: 'command-line',
      mode,
      target: 'node20',
      entry: './addin/command-line/planrow.ts',
      experiments: { outputModule: true },
      output: moduleOutput('planrow.mjs', false),
      optimization: { minimize: false },
      plugins: [
        new webpack.BannerPlugin({ banner: '#!/usr/bin/env node', raw: true }),
        new webpack.optimize.LimitChunkCountPlugin({ maxChunks: 1 }),
      ],
    },
    {
      ...shared,
      name: 'pane',
      mode,
      target: 'web',
      entry: './addin/pane/main.ts',
      output: { path: path.join(output, 'pane'), filename: 'pane.js' },
    },
  ];
};
