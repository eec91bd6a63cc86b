import { defineConfig } from 'vitest/config';
import { library } from '../../vite.shared';

export default defineConfig(library('mechanics', { setupFiles: ['src/testing/seed-properties.ts'] }));
