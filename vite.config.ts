import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import vue from '@vitejs/plugin-vue';
import { defineConfig, type Plugin } from 'vite';

const KEPT_ON_THE_DEVICE = /\.(js|css|html|svg|png|woff2|webmanifest)$/;

/** Writes dist/sw.js: src/sw.js with the list of the files of this build, and a version made from their contents. */
function serviceWorker(): Plugin {
  let out = 'dist';
  return {
    name: 'service-worker',
    apply: 'build',
    enforce: 'post',
    configResolved(config) {
      out = path.resolve(config.root, config.build.outDir);
    },
    writeBundle() {
      const names = fs.readdirSync(out, { recursive: true, encoding: 'utf8' });
      const files = names.filter((name) => KEPT_ON_THE_DEVICE.test(name) && name !== 'sw.js').sort();
      const version = createHash('sha256');
      for (const file of files) version.update(file).update(fs.readFileSync(path.join(out, file)));
      const values = { __VERSION__: version.digest('hex').slice(0, 12), __FILES__: files.map((file) => `/${file}`) };
      let source = fs.readFileSync('src/sw.js', 'utf8');
      for (const [name, value] of Object.entries(values)) source = source.replaceAll(name, JSON.stringify(value));
      fs.writeFileSync(path.join(out, 'sw.js'), source);
    },
  };
}

export default defineConfig({
  plugins: [vue(), serviceWorker()],
  worker: { format: 'es' },
  // Fonts and icons stay files: the page's security policy allows no data: addresses.
  build: { target: 'es2022', assetsInlineLimit: 0, rollupOptions: { checks: { bundlerTimings: false } } },
});
