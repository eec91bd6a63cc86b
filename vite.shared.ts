import { builtinModules } from 'node:module';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import type { UserConfig } from 'vite';
import type { InlineConfig } from 'vitest/node';

export const workspaceRoot = fileURLToPath(new URL('.', import.meta.url));

/** Where a project's build goes: its own `dist`, or below BUILD_DIR so that tests never empty the `dist` of a running server. */
export function buildDir(project: string): string {
  const base = process.env['BUILD_DIR'];
  return base ? path.resolve(workspaceRoot, base, project) : 'dist';
}

/** Test settings of every project; the JSON report is what `npm test` counts. */
export function tests(project: string, overrides: InlineConfig = {}): InlineConfig {
  const reports = process.env['TEST_REPORTS_DIR'];
  return {
    include: ['src/**/*.spec.{ts,tsx}'],
    retry: 0,
    reporters: reports ? ['default', 'json'] : ['default'],
    outputFile: reports ? { json: path.resolve(workspaceRoot, reports, `${project}.json`) } : undefined,
    ...overrides,
  };
}

/** A library: nothing is built, its sources are bundled by the application that uses it. */
export function library(project: string, overrides: InlineConfig = {}): UserConfig & { test: InlineConfig } {
  return { resolve: { tsconfigPaths: true }, test: tests(project, overrides) };
}

/** A Node program built to ESM files with source maps; packages stay external, our own libraries are bundled. */
export function nodeProgram(
  project: string,
  entries: Record<string, string>,
  overrides: InlineConfig = {},
): UserConfig & { test: InlineConfig } {
  return {
    resolve: { tsconfigPaths: true },
    build: {
      ssr: true,
      outDir: buildDir(project),
      emptyOutDir: true,
      target: 'node20',
      sourcemap: true,
      minify: false,
      rolldownOptions: {
        input: entries,
        external: [...builtinModules, ...builtinModules.map((name) => `node:${name}`)],
        output: { format: 'es', entryFileNames: '[name].js' },
      },
    },
    ssr: { target: 'node' },
    test: tests(project, overrides),
  };
}
