import { defineConfig } from 'vitest/config';
import { library } from '../../vite.shared.ts';

export default defineConfig(
  library('tests-browser', {
    include: ['src/**/*.e2e.ts'],
    testTimeout: 90_000,
    hookTimeout: 90_000,
    // One browser at a time: it draws in software and needs the cores.
    maxWorkers: 1,
  }),
);
