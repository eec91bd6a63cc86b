import { defineConfig } from 'vitest/config';
import { library } from '../../vite.shared.ts';

export default defineConfig(
  library('tests-integration', {
    include: ['src/**/*.int.spec.ts'],
    testTimeout: 30_000,
    hookTimeout: 60_000,
    // Each file has a database of its own, and each of the two runners a Redis database.
    maxWorkers: 2,
  }),
);
