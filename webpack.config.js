import { readFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import CopyPlugin from 'copy-webpack-plugin';
import HtmlPlugin from 'html-webpack-plugin';
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

const fromManifest = (file) => path.join(root, 'manifest', file);
const settings = JSON.parse(readFileSync(fromManifest('settings.json'), 'utf8'));

/** The manifest for another origin; a variant of its own has an id and a name of its own, and stands beside the real one. */
const manifestFor = (origin, variant) => (content) => {
  const moved = content.toString().replaceAll(settings.manifestOrigin, origin);
  return variant === undefined
    ? moved
    : moved
        .replace(settings.id, variant.id)
        .replace('<DisplayName DefaultValue="Planrow"/>', `<DisplayName DefaultValue="${variant.name}"/>`);
};

/** The static folder that a firm puts on its server: pages, scripts, icons and manifests. */
const paneBuild = (mode, server) => ({
  ...shared,
  name: 'pane',
  mode,
  target: ['web', 'es2022'],
  entry: { pane: './addin/pane/main.ts' },
  output: {
    path: path.join(output, 'pane'),
    filename: '[name].[contenthash:8].js',
    chunkFilename: '[name].[contenthash:8].js',
    clean: true,
  },
  optimization: {
    // What page and worker both need is one file, fetched once.
    splitChunks: { chunks: 'all', minSize: 8_000 },
  },
  plugins: [
    new HtmlPlugin({ filename: 'pane.html', template: './addin/pane/pane.html', scriptLoading: 'defer' }),
    new CopyPlugin({
      patterns: [
        { from: './addin/pane/pages', to: '.' },
        { from: './manifest/icons/*.png', to: 'icons/[name][ext]' },
        {
          from: fromManifest('manifest.xml'),
          to: 'manifest.xml',
          transform: manifestFor(process.env.PLANROW_ORIGIN ?? settings.productionOrigin),
        },
        {
          from: fromManifest('manifest.xml'),
          to: 'manifest-development.xml',
          transform: manifestFor(settings.development.origin, settings.development),
        },
      ],
    }),
  ],
  devServer: {
    server,
    // Pages are loaded anew: exchanging parts while they run would need eval, which their policy forbids.
    hot: false,
    port: Number(new URL(settings.development.origin).port),
    headers: { 'Access-Control-Allow-Origin': '*' },
    client: { overlay: false },
  },
});

/**
 * An add-in's page is shown only over https, with a certificate that the machine trusts. `npm run dev` makes one and
 * asks once whether to trust it; `npm run dev -- --env selfSigned` asks nothing, for a browser that may complain.
 */
const developmentServer = async (env) => {
  if (env.WEBPACK_SERVE !== true || env.selfSigned === true) {
    return { type: 'https' };
  }
  const { getHttpsServerOptions } = await import('office-addin-dev-certs');
  return { type: 'https', options: await getHttpsServerOptions() };
};

export default async (env = {}, argv = {}) => {
  const mode = argv.mode ?? 'production';
  const server = await developmentServer(env);
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
    paneBuild(mode, server),
  ];
};
