// The JSON manifest and the icons that it names in one archive, as an administrator uploads it.

import JSZip from 'jszip';
import webpack from 'webpack';

const FILES = ['manifest.json', 'assets/icon-192.png', 'assets/outline-32.png'];

/** Archives hold times; the same build gives the same bytes. */
const EPOCH = new Date(Date.UTC(1980, 0, 1));

/** Adds `foldplan.zip` to a site that holds the files. */
export class AppPackage {
  apply(compiler) {
    compiler.hooks.thisCompilation.tap('AppPackage', (compilation) => {
      const stage = webpack.Compilation.PROCESS_ASSETS_STAGE_OPTIMIZE_TRANSFER;
      compilation.hooks.processAssets.tapPromise({ name: 'AppPackage', stage }, async () => {
        const zip = new JSZip();
        for (const file of FILES) zip.file(file, compilation.getAsset(file).source.buffer(), { date: EPOCH, createFolders: false });
        const archive = await zip.generateAsync({ type: 'nodebuffer', compression: 'DEFLATE' });
        compilation.emitAsset('foldplan.zip', new webpack.sources.RawSource(archive));
      });
    });
  }
}
