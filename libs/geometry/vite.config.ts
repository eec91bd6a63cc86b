import { defineConfig } from 'vitest/config';
import { library } from '../../vite.shared.ts';

export default defineConfig(library('geometry', { setupFiles: ['src/testing/seed-properties.ts'], testTimeout: 30_000 }));
