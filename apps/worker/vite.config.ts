import { defineConfig } from 'vitest/config';
import { nodeProgram } from '../../vite.shared.ts';

export default defineConfig(nodeProgram('apps/worker', { main: 'src/main.ts', 'measure-thread': 'src/measuring/measure-thread.ts' }));
