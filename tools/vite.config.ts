import { defineConfig } from 'vitest/config';
import { library } from '../vite.shared.ts';

export default defineConfig(library('tools', { include: ['**/*.spec.ts'], testTimeout: 60_000 }));
