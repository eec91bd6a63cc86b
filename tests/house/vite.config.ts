import { defineConfig } from 'vitest/config';
import { library } from '../../vite.shared.ts';

export default defineConfig(library('tests-house', { testTimeout: 60_000, hookTimeout: 120_000 }));
