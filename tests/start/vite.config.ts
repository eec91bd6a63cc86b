import { defineConfig } from 'vitest/config';
import { library } from '../../vite.shared.ts';

export default defineConfig(library('tests-start', { include: ['src/**/*.int.spec.ts'], testTimeout: 120_000, hookTimeout: 120_000 }));
