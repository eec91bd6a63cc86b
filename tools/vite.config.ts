import { defineConfig } from 'vitest/config';
import { library } from '../vite.shared';

export default defineConfig(library('tools', { include: ['**/*.spec.ts'], testTimeout: 60_000 }));
