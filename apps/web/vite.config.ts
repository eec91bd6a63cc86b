import react from '@vitejs/plugin-react';
import { defineConfig } from 'vitest/config';
import { buildDir, tests } from '../../vite.shared.ts';
import { dropUnusedBlueprint } from './src/styles/drop-unused-blueprint';

const apiPort = process.env['API_PORT'] ?? '4600';
const webPort = process.env['WEB_PORT'];

export default defineConfig({
  plugins: [react()],
  resolve: { tsconfigPaths: true },
  css: { postcss: { plugins: [dropUnusedBlueprint] } },
  build: {
    outDir: buildDir('apps/web'),
    emptyOutDir: true,
    target: 'es2022',
    sourcemap: true,
    // Nothing may be inlined as a data: address but what Blueprint's own style sheet carries: the page's policy names its sources.
    assetsInlineLimit: 0,
  },
  server: {
    host: '127.0.0.1',
    port: webPort ? Number(webPort) : 4607,
    strictPort: webPort !== undefined,
    proxy: { '/api': { target: `http://127.0.0.1:${apiPort}` } },
  },
  test: tests('web', { environment: 'happy-dom' }),
});
