import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import tailwindcss from '@tailwindcss/vite';
import react from '@vitejs/plugin-react';
import { build, preview } from 'vite';

/** Builds the chart's own page and serves it on a free port: no server, no account, only the chart. */
export async function serveChartPage(): Promise<{ url: string; stop: () => Promise<void> }> {
  const outDir = await mkdtemp(join(tmpdir(), 'hummock-chart-page-'));
  const shared = { root: import.meta.dirname, configFile: false, logLevel: 'error' } as const;
  await build({ ...shared, base: './', plugins: [react(), tailwindcss()], build: { outDir, emptyOutDir: true } });
  const server = await preview({ ...shared, build: { outDir }, preview: { host: '127.0.0.1', port: 0 } });
  const address = server.httpServer.address();
  if (address === null || typeof address === 'string') throw new Error('The chart page has no port.');
  return {
    url: `http://127.0.0.1:${address.port}/`,
    async stop() {
      await server.close();
      await rm(outDir, { recursive: true, force: true });
    },
  };
}
