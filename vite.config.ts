import { createHash } from 'node:crypto';
import fs from 'node:fs';
import path from 'node:path';
import vue from '@vitejs/plugin-vue';
import { defineConfig, type Plugin } from 'vite';

function serviceWorker(): Plugin {
  let out = 'dist';
  return {
    name: 'service-worker',
    apply: 'build',
    enforce: 'post',
    configResolved(c) {
      out = path.resolve(c.root, c.build.outDir);
    },
    closeBundle() {
      const files = (fs.readdirSync(out, { recursive: true }) as string[])
        .filter((f) => /\.(js|css|html|svg|woff2|webmanifest)$/.test(f) && f !== 'sw.js')
        .sort();
      const h = createHash('sha256');
      for (const f of files) h.update(f).update(fs.readFileSync(path.join(out, f)));
      fs.writeFileSync(
        path.join(out, 'sw.js'),
        fs
          .readFileSync('src/sw.js', 'utf8')
          .replace('__VERSION__', h.digest('hex').slice(0, 12))
          .replace('__FILES__', JSON.stringify(files.map((f) => `/${f}`))),
      );
    },
  };
}
export default defineConfig({
  plugins: [vue(), serviceWorker()],
  worker: { format: 'es' },
  build: { target: 'es2022', assetsInlineLimit: 0 },
});
