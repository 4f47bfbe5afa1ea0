import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { defineConfig } from 'vite';

const apiOrigin = process.env.HUMMOCK_API ?? 'http://127.0.0.1:4680';

export default defineConfig({
  plugins: [react(), tailwindcss()],
  html: { cspNonce: '__CSP_NONCE__' }, // the server puts a nonce of each response in its place
  build: {
    outDir: 'dist/client',
    target: 'es2023',
    manifest: true, // the page bench measures the first route from it
    assetsInlineLimit: 0, // the page's policy allows no data: scripts or fonts
  },
  worker: { format: 'es' },
  server: {
    host: '127.0.0.1',
    watch: { ignored: ['**/.data/**', '**/.cache/**', '**/dist/**', '**/tests/**'] },
    proxy: { '/api': { target: apiOrigin } },
  },
});
