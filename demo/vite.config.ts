import { defineConfig } from 'vitest/config';
import { nodeProgram } from '../vite.shared';

export default defineConfig(nodeProgram('demo', { seed: 'src/seed.ts' }));
