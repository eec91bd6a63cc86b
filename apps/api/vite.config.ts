import { defineConfig } from 'vitest/config';
import { nodeProgram } from '../../vite.shared.ts';

export default defineConfig(nodeProgram('apps/api', { main: 'src/main.ts', openapi: 'src/openapi/main.ts' }));
