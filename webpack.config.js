// Builds the static site (dist/) and the command line (dist-cli/).
//
// Options, each as --env name=value:
//   base      https address that the site will be served from (default https://localhost:3000)
//   officejs  "vendor" loads Office.js from its vendor's address (default), "self" puts a copy into dist/office/
//   development  readable pages, built in seconds
//   bench     build the benchmark instead, into dist-cli/
//   excel     serve over https with the development certificate, for `npm run excel`

import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import path from 'node:path';
import CopyPlugin from 'copy-webpack-plugin';
import CustomFunctionsMetadataPlugin from 'custom-functions-metadata-plugin';
import HtmlPlugin from 'html-webpack-plugin';
import MiniCssExtractPlugin from 'mini-css-extract-plugin';
import webpack from 'webpack';
import { AppPackage } from './manifest/app-package.js';
import { manifestFor, siteAddress } from './manifest/manifest-for.js';
import { helpPage } from './src/help/help-page.js';
import { readFamily, readSentences } from './src/help/sources.js';

const root = import.meta.dirname;
const at = (...parts) => path.join(root, ...parts);
const require = createRequire(import.meta.url);
const { version } = JSON.parse(readFileSync(at('package.json'), 'utf8'));

const VENDOR_OFFICE_JS = 'https://appsforoffice.microsoft.com/lib/1/hosted/office.js';

/** Source files that hold worksheet functions, in the order of the function list. */
const FAMILIES = ['landing', 'rates', 'spurs', 'filter', 'noise', 'converter'].map((family) => at('src/functions', `${family}.ts`));

/**
 * The part of the vendor's package that a self-hosted Office.js consists of. The rest is typings, debug builds, other hosts, and the
 * script that reports on the use of add-ins: it is left out on purpose, and the library does without.
 */
const OFFICE_FILES = [
  'office.js', 'excel-web-16.00.js', 'excel-win32-16.01.js', 'excel-mac-16.00.js', 'o15apptofilemappingtable.js',
  'custom-functions-runtime.js', '*/office_strings.js',
];

/** Turns the generated metadata into ours: errors in cells reach the function, rich values don't, and each function knows its help. */
class FunctionsJson {
  constructor(base) {
    this.base = base;
  }

  apply(compiler) {
    compiler.hooks.compilation.tap('FunctionsJson', (compilation) => {
      const stage = webpack.Compilation.PROCESS_ASSETS_STAGE_ADDITIONS;
      compilation.hooks.processAssets.tap({ name: 'FunctionsJson', stage }, () => {
        const generated = JSON.parse(compilation.getAsset('functions.json').source.source().toString());
        const metadata = {
          allowErrorForDataTypeAny: true,
          functions: generated.functions.map((f) => ({ ...f, helpUrl: `${this.base}/help.html#${f.id}` })),
        };
        compilation.updateAsset('functions.json', new webpack.sources.RawSource(`${JSON.stringify(metadata, null, 2)}\n`));
        const page = helpPage(metadata, FAMILIES.map(readFamily), readSentences(at('src/engine/fault.ts')), version);
        compilation.emitAsset('help.html', new webpack.sources.RawSource(page));
        compilation.emitAsset('search.js', new webpack.sources.RawSource(readFileSync(at('src/help/search.js'), 'utf8')));
      });
    });
  }
}

/** The development certificate that Excel wants. Where there is none yet it is made and installed, which asks the user for leave. */
async function certificate() {
  const { getHttpsServerOptions } = await import('office-addin-dev-certs');
  return getHttpsServerOptions();
}

const typescript = { test: /\.ts$/, exclude: /node_modules/, use: { loader: 'ts-loader', options: { transpileOnly: true } } };

const common = (name, mode) => ({
  name,
  mode,
  context: root,
  devtool: mode === 'production' ? 'source-map' : 'cheap-source-map',
  resolve: { extensions: ['.ts', '.js'] },
  performance: { hints: false },
  cache: { type: 'filesystem', cacheDirectory: at('.cache'), name: `${name}-${mode}`, buildDependencies: { config: [import.meta.filename] } },
});

export default async (env) => {
  const mode = env.development ? 'development' : 'production';
  const base = siteAddress(env.base ?? 'https://localhost:3000');
  const selfHosted = (env.officejs ?? 'vendor') === 'self';
  const officeJs = selfHosted ? 'office/office.js' : VENDOR_OFFICE_JS;
  const page = (name, template) => new HtmlPlugin({
    filename: `${name}.html`, template: at(template), chunks: [name], templateParameters: { officeJs, version, development: mode === 'development' }, scriptLoading: 'defer',
  });

  const functions = {
    ...common('functions', 'production'), // always as shipped: it is small, and what tests and users run is one thing
    target: ['web', 'es2020'],
    entry: { functions: at('src/functions/index.ts') },
    output: { path: at('dist'), filename: '[name].js' },
    module: { rules: [typescript] },
    plugins: [
      new CustomFunctionsMetadataPlugin({ output: 'functions.json', input: FAMILIES }),
      new FunctionsJson(base),
    ],
    cache: false, // the metadata plugin adds its calls at load time and must see every file
  };

  const site = {
    ...common('site', mode),
    target: ['web', 'es2022'],
    entry: { pane: at('src/main-office.ts'), workbench: at('src/main-workbench.ts') },
    output: { path: at('dist'), filename: '[name].js', chunkFilename: '[name].[contenthash].js', assetModuleFilename: 'assets/[name][ext]' },
    module: { rules: [typescript, { test: /\.css$/, use: [MiniCssExtractPlugin.loader, 'css-loader'] }] },
    optimization: { nodeEnv: 'production' }, // packages as they are shipped, with no advice on the console
    plugins: [
      new MiniCssExtractPlugin(),
      // Rules for hyphens in sixty languages: a sheet asks for none but these.
      new webpack.IgnorePlugin({ resourceRegExp: /^\.\/(?!en-gb-)[a-z]{2,3}(-[a-z0-9]+)*-[\w-]{8}\.js$/, contextRegExp: /engine-render/ }),
      page('pane', 'src/pane/pane.html'),
      page('workbench', 'src/workbench/workbench.html'),
      new webpack.DefinePlugin({ FOLDPLAN_VERSION: JSON.stringify(version) }),
      new CopyPlugin({
        patterns: [
          { from: at('assets'), to: 'assets', globOptions: { ignore: ['**/readme/**'] } },
          ...['manifest.xml', 'manifest.json'].map((file) => ({ from: at('manifest', file), to: file, transform: () => manifestFor(base, version, file) })),
          { from: at('manifest/about.html'), to: 'about.html', transform: (page) => page.toString().replaceAll('{{version}}', version) },
          ...(selfHosted
            ? OFFICE_FILES.map((from) => ({ from, to: 'office', context: path.dirname(require.resolve('@microsoft/office-js/dist/office.js')) }))
            : []),
        ],
      }),
      new AppPackage(),
    ],
    devServer: {
      host: 'localhost', // plans are for this machine alone
      port: env.excel ? 3000 : 'auto', // from 3000 on, the first that is free
      open: env.excel ? false : ['/workbench.html'],
      static: false,
      // The pages as they are shipped: nothing of the server in them.
      client: false,
      hot: false,
      liveReload: false,
      onListening: ({ options }) => {
        if (!env.excel) process.stdout.write(`\nThe workbench: http://localhost:${options.port}/workbench.html (stop it with Ctrl+C)\n\n`);
      },
      ...(env.excel ? { server: { type: 'https', options: await certificate() }, headers: { 'access-control-allow-origin': '*' } } : {}),
    },
  };

  /** A program for Node. Packages stay where npm put them: only our own sources are bundled. */
  const program = (name, source) => ({
    ...common(name, mode),
    target: 'node20',
    devtool: 'source-map',
    optimization: { minimize: false },
    entry: { [name]: at(source) },
    output: { path: at('dist-cli'), filename: '[name].cjs', library: { type: 'commonjs2' } },
    module: { rules: [typescript] },
    externals: [({ request }, done) => (/^[./]/.test(request) || path.isAbsolute(request) ? done() : done(null, `commonjs ${request}`))],
    plugins: [new webpack.DefinePlugin({ FOLDPLAN_VERSION: JSON.stringify(version) })],
  });

  /** The page in which the benchmark measures the pictures. */
  const benchPage = {
    ...common('bench-page', mode),
    target: site.target,
    entry: { 'bench-pictures': at('test/bench/pictures-page.ts') },
    output: { path: at('dist-cli'), filename: '[name].js' },
    module: site.module,
    plugins: [new MiniCssExtractPlugin()],
  };

  if (env.bench) return [functions, program('bench', 'test/bench/run.ts'), benchPage];
  if (env.WEBPACK_SERVE) {
    process.env.WEBPACK_DEV_SERVER_BASE_PORT ??= '3000';
    return [site, functions].map((config) => ({ ...config, stats: 'errors-warnings', infrastructureLogging: { level: 'error' } }));
  }
  return [functions, site, program('recalc', 'src/main-recalc.ts')];
};
