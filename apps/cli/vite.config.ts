import { defineConfig } from 'vitest/config';
import { nodeProgram } from '../../vite.shared.ts';

export default defineConfig(nodeProgram('apps/cli', { main: 'src/main.ts', 'hash-thread': 'src/hash-thread.ts' }));
