import { mkdtempSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { mayImport } from '../../../eslint.config.mjs';
import { findRefusals, lint, listProjects, type Project } from './linter';

const boundaryRule = '@nx/enforce-module-boundaries';
const folder = mkdtempSync(path.join(os.tmpdir(), 'masswright-house-'));
let projects: Project[];
beforeAll(() => {
  projects = listProjects(folder);
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function getRoot(name: string): string {
  const project = projects.find((candidate) => candidate.name === name);
  if (!project) throw new Error(`There is no project ${name}.`);
  return project.root;
}

const plantedFile = (project: string) => `${getRoot(project)}/src/planted.ts`;
const table = mayImport as Record<string, string[]>;
/** Those that others import by name; applications are imported by nobody. */
const libraries = Object.keys(table).filter((name) => !['api', 'worker', 'web', 'cli'].includes(name));
const applications = ['api', 'worker', 'web'];
/** By which name a project imports a library: the pages have an entry of their own to geometry. */
const findEntry = (project: string, library: string): string => `@masswright/${library}${project === 'web' && library === 'geometry' ? '/web-worker' : ''}`;
/** An installation without its command line has no such project yet. */
const rows = Object.keys(table).filter((name) => name !== 'cli');

describe('the table of imports', () => {
  it('has a row for every project but those for development, and each project has its own tag', () => {
    const free = projects.filter(({ tags }) => ['demo', 'tests', 'bench', 'tools'].some((name) => tags.includes(`project:${name}`)));
    const governed = projects.filter((project) => !free.includes(project)).map(({ name }) => name);
    expect(governed.filter((name) => !(name in table))).toEqual([]);
    for (const { name, tags } of projects.filter((project) => !free.includes(project))) expect(tags, name).toEqual([`project:${name}`]);
    expect(rows.filter((name) => !governed.includes(name))).toEqual([]);
  });

  it.each(rows)('is enforced for %s: every library that is not in its row is refused, every one that is passes', async (project) => {
    const others = libraries.filter((library) => library !== project);
    for (const library of others) {
      const allowed = table[project]?.includes(library) ?? false;
      const refusals = await findRefusals(plantedFile(project), findEntry(project, library));
      expect(refusals.length > 0, `${project} importing ${library}`).toBe(!allowed);
    }
    expect(others.filter((library) => !table[project]?.includes(library)).length, 'rows that allow everything').toBeGreaterThan(0);
  });

  it.each(['demo', 'tests/support', 'tests/integration', 'bench', 'tools'])('lets nothing that ships import from %s', async (development) => {
    for (const project of ['units', 'drizzle', 'storage', ...applications]) {
      const file = plantedFile(project);
      const relative = path.posix.relative(path.posix.dirname(file), `${development}/src/planted`);
      expect(await findRefusals(file, relative), `${project} importing ${relative}`).toContain(boundaryRule);
    }
  });

  it('lets no library or application import an application', async () => {
    for (const project of ['mechanics', 'drizzle', 'api', 'worker', 'web']) {
      for (const application of applications.filter((name) => name !== project)) {
        const file = plantedFile(project);
        const relative = path.posix.relative(path.posix.dirname(file), `${getRoot(application)}/src/planted`);
        expect(await findRefusals(file, relative), `${project} importing ${relative}`).toContain(boundaryRule);
      }
    }
  });

  it('lets tests start the services of the tools', async () => {
    expect(await findRefusals('tests/house/src/planted.ts', '../../../tools/services/index.mjs')).toEqual([]);
  });
});

describe('packages', () => {
  it.each([
    ['api', 'bullmq'],
    ['api', '@nestjs/bullmq'],
    ['api', 'ioredis'],
    ['api', '@masswright/geometry'],
    ['geometry', 'node:fs'],
    ['geometry', 'fs'],
    ['geometry', 'fs/promises'],
    ['geometry', 'three'],
    ['geometry', 'three/addons/loaders/STLLoader.js'],
    ['units', 'node:crypto'],
    ['mechanics', 'react'],
    ['mechanics', '@nestjs/common'],
    ['mechanics', 'drizzle-orm/pg-core'],
    ['contracts', 'node:buffer'],
    ['client', 'pg'],
    ['web', 'node:path'],
    ['web', 'drizzle-orm'],
    ['web', '@nestjs/common'],
    ['web', '@aws-sdk/client-s3'],
    ['web', '@masswright/geometry'],
    ['web', '@masswright/geometry/measurer'],
    ['api', '@masswright/geometry/web-worker'],
  ])('%s may not import %s', async (project, imported) => {
    expect(await findRefusals(plantedFile(project), imported)).toContain('no-restricted-imports');
  });

  it.each([
    ['web', './features/events/model/stream'],
    ['web', 'react'],
    ['web', '@masswright/geometry/web-worker'],
    ['geometry', 'pako'],
    ['worker', 'bullmq'],
    ['storage', 'node:crypto'],
    ['contracts', 'zod'],
  ])('%s may import %s', async (project, imported) => {
    expect(await findRefusals(plantedFile(project), imported)).toEqual([]);
  });
});

describe('arithmetic that is recorded', () => {
  it.each(['Math.hypot(3, 4)', 'Math.pow(2, 3)', 'Math.sin(1)', 'Math.atan2(1, 2)', '2 ** 3'])('does not use %s', async (expression) => {
    for (const project of ['geometry', 'mechanics']) {
      const messages = await lint(plantedFile(project), `export const planted = ${expression};\n`);
      expect(messages.filter((message) => /^no-restricted-(properties|syntax):/.test(message)), project).toHaveLength(1);
    }
  });

  it('may use a square root', async () => {
    expect(await lint(plantedFile('mechanics'), 'export const planted = Math.sqrt(2);\n')).toEqual([]);
  });
});

describe('the layers of the pages', () => {
  const rule = 'house/page-layers';
  it.each([
    ['features/parts/components/planted.tsx', '../../projects/api/projects'],
    ['features/parts/components/planted.tsx', '../../projects'],
    ['features/parts/planted.ts', '../projects/model/name'],
    ['features/parts/components/planted.tsx', '../../../routes/part'],
    ['features/parts/model/planted.ts', '../../../app/router'],
    ['components/planted.tsx', '../features/parts/model/row'],
    ['lib/planted.ts', '../components/page'],
    ['viewer/planted.tsx', '../features/parts/model/row'],
  ])('%s may not import %s', async (file, imported) => {
    expect(await findRefusals(`apps/web/src/${file}`, imported)).toEqual([rule]);
  });

  it.each([
    ['features/parts/components/planted.tsx', '../model/row'],
    ['features/parts/components/planted.tsx', './part-table'],
    ['features/parts/components/planted.tsx', '../../../lib/api'],
    ['features/parts/planted.ts', '../../components/page'],
    ['routes/planted.tsx', '../features/parts/components/part-table'],
    ['app/planted.tsx', '../routes/part'],
  ])('%s may import %s', async (file, imported) => {
    expect(await findRefusals(`apps/web/src/${file}`, imported)).toEqual([]);
  });

  it('are kept by an import that is awaited and by a re-export, too', async () => {
    const file = 'apps/web/src/features/parts/model/planted.ts';
    for (const text of ["export const planted = () => import('../../projects/api/projects');\n", "export * from '../../projects/api/projects';\n"]) {
      expect((await lint(file, text)).map((message) => message.split(':')[0])).toEqual([rule]);
    }
  });
});
