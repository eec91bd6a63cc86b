import { defineConfig, mergeConfig } from 'vitest/config';
import { nodeProgram } from '../vite.shared.ts';

// The migration program finds its SQL files beside it.
export default defineConfig(
  mergeConfig(nodeProgram('drizzle', { migrate: 'src/migration/main.ts' }), { publicDir: 'migrations', build: { copyPublicDir: true } }),
);
