import { defineConfig } from 'vitest/config';
import { nodeProgram } from '../vite.shared.ts';

export default defineConfig(nodeProgram('demo', { seed: 'src/seed.ts' }));
