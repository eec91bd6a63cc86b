import { defineConfig } from 'vitest/config';
import { library } from '../../vite.shared';

export default defineConfig(library('units', { setupFiles: ['src/testing/seed-properties.ts'] }));
