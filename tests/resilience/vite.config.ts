import { defineConfig } from 'vitest/config';
import { library } from '../../vite.shared.ts';

export default defineConfig(
  library('tests-resilience', {
    include: ['src/**/*.int.spec.ts'],
    testTimeout: 120_000,
    hookTimeout: 120_000,
    // One stack at a time: kills are meant to hurt one file of tests only.
    maxWorkers: 1,
  }),
);
