import { createHash } from 'node:crypto';
import { readdirSync } from 'node:fs';
import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig, type Plugin } from 'vite';

const apiOrigin = process.env.HUMMOCK_API ?? 'http://127.0.0.1:4680';

/** Tells the service worker which files of this build to keep for times without a connection. */
function offlineFiles(): Plugin {
  return {
    name: 'offline-files',
    apply: 'build',
    generateBundle: {
      order: 'post',
      handler(_options, bundle) {
        const worker = bundle['service-worker.js'];
        if (worker?.type !== 'chunk') return; // a build of something else than the product
        const built = Object.keys(bundle).filter((name) => /\.(js|css|woff2)$/.test(name) && name !== worker.fileName);
        const beside = readdirSync('public', { withFileTypes: true }).filter((entry) => entry.isFile());
        const files = [...built, ...beside.map(({ name }) => name)].map((name) => `/${name}`).sort();
        const build = createHash('sha256').update(files.join('\n')).digest('hex').slice(0, 12);
        worker.code = worker.code.replace('__OFFLINE_FILES__', JSON.stringify({ build, files }));
      },
    },
  };
}

export default defineConfig({
  plugins: [react(), tailwindcss(), offlineFiles()],
  html: { cspNonce: '__CSP_NONCE__' }, // the server puts a nonce of each response in its place
  build: {
    outDir: 'dist/client',
    target: 'es2023',
    manifest: true, // the page bench measures the first route from it
    assetsInlineLimit: 0, // the page's policy allows no data: scripts or fonts
    rollupOptions: {
      input: { index: 'index.html', 'service-worker': 'src/service-worker.ts' },
      output: {
        entryFileNames: ({ name }) => (name === 'service-worker' ? '[name].js' : 'assets/[name]-[hash].js'),
      },
    },
  },
  worker: { format: 'es' },
  server: {
    host: '127.0.0.1',
    watch: { ignored: ['**/.data/**', '**/.cache/**', '**/dist/**', '**/tests/**'] },
    proxy: { '/api': { target: apiOrigin } },
  },
});
