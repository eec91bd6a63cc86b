import { readFileSync } from 'node:fs';
import { createRequire } from 'node:module';
import type { BrowserContext, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { password, type ApiUser } from '../../support/api-user';
import { block } from '../../support/meshes';
import { answerUnit, chooseFiles, closeDialog, findDialog, meshFile } from './intake-page';
import { openStage, type Stage } from './stage';

let stage: Stage;
let founder: ApiUser;
let places: Record<string, string>;
const axeSource = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8');

interface AxeResult {
  violations: { id: string; nodes: { target: string[]; failureSummary?: string }[] }[];
}

beforeAll(async () => {
  stage = await openStage();
  founder = stage.visit();
  await founder.signUp('Ines Marsh', 'Halyard Kites');
  await founder.expect('POST', '/invitations', { email: 'guest@halyard.example', role: 'reader' });
  const { id: projectId } = await founder.createProject('Reel, mark 2');
  const empty = await founder.createProject('Nothing yet');
  const good = block([0, 0, 0], [40, 30, 20]);
  const open = good.slice(0, good.length - 50);
  new DataView(open.buffer).setUint32(80, 11, true);
  const add = async (name: string, bytes: Uint8Array, setting?: { lengthUnit: 'mm' | null; densityKgM3: number | null }) => (await founder.waitForRun((await founder.addMesh(projectId, name, bytes, setting)).id)).id;
  const part = async (id: Promise<string>) => `/projects/${projectId}/parts/${await id}`;
  places = {
    projects: '/',
    project: `/projects/${projectId}`,
    'empty project': `/projects/${empty.id}`,
    part: await part(add('block.stl', good)),
    'open part': await part(add('open.stl', open)),
    'refused part': await part(add('cut.stl', good.slice(0, 300))),
    'part without a unit': await part(add('unitless.stl', block([0, 0, 0], [1, 1, 1]), { lengthUnit: null, densityKgM3: null })),
    materials: '/materials',
    'one material': '/materials/al-6061-t6',
    people: '/people',
    'not found': '/projects/00000000-0000-4000-8000-000000000000',
    nowhere: '/no/such/place',
  };
});
afterAll(async () => {
  await stage.close();
});

async function signIn(page: Page): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(founder.session?.user.email ?? '');
  await page.getByLabel('Password').fill(password);
  await page.keyboard.press('Enter');
  await page.getByRole('heading', { name: 'Projects' }).waitFor();
}

async function checkAccess(page: Page, place: string): Promise<string[]> {
  await page.getByRole('heading').first().waitFor();
  await page.waitForLoadState('networkidle').catch(() => undefined);
  await page.waitForTimeout(300);
  await page.evaluate(axeSource);
  const result = await page.evaluate(async () => {
    const { axe } = window as unknown as { axe: { run: (options: object) => Promise<unknown> } };
    return (await axe.run({ runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'] })) as AxeResult;
  });
  return result.violations.flatMap(({ id, nodes }) => nodes.map((node) => `${place}: ${id} at ${node.target.join(' ')}`));
}

describe.each(['light', 'dark'] as const)('every page, %s', (colorScheme) => {
  let context: BrowserContext;
  let page: Page;
  beforeAll(async () => {
    ({ context, page } = await stage.openBrowser({ colorScheme }));
  });
  afterAll(async () => {
    await context.close();
  });

  it('is accessible before signing in', async () => {
    const found: string[] = [];
    for (const path of ['/sign-in', '/sign-up', '/forgotten-password', '/invitation#token=AAAAAAAAAAAAAAAAAAAAAA', '/new-password#token=AAAAAAAAAAAAAAAAAAAAAA']) {
      await page.goto('about:blank');
      await page.goto(path);
      found.push(...(await checkAccess(page, path)));
    }
    expect(found).toEqual([]);
  });

  it('is accessible after, and says in its title where it is', async () => {
    await signIn(page);
    const found: string[] = [];
    for (const [name, path] of Object.entries(places)) {
      await page.goto(path);
      found.push(...(await checkAccess(page, name)));
      expect(await page.title(), name).toMatch(/Masswright/);
    }
    expect(found).toEqual([]);
  });

  it('is accessible in each step of adding meshes', async () => {
    const found: string[] = [];
    const look = async (step: string) => found.push(...(await checkAccess(page, step)));
    const dialog = findDialog(page);
    await page.goto(places['project'] ?? '');
    await page.getByRole('button', { name: 'Add meshes' }).first().click();
    await look('choosing files');
    await closeDialog(page);
    const size = colorScheme === 'light' ? 7 : 8;
    const files = [1, 2].map((count) => meshFile(`${colorScheme} ${count}.stl`, block([0, 0, 0], [size, count, 3])));
    await chooseFiles(page, [...files, meshFile('letter.stl', new TextEncoder().encode('Dear Sir or Madam')), meshFile('notes.txt', new Uint8Array(9))]);
    await dialog.getByRole('heading', { name: /What unit/ }).waitFor();
    await look('the unit');
    await dialog.getByRole('button', { name: 'Decide file by file' }).click();
    await look('the unit, file by file');
    await dialog.getByRole('button', { name: 'Done' }).click();
    await expect.poll(() => dialog.getByRole('listitem').filter({ hasText: /Measured/ }).count(), { timeout: 30_000 }).toBe(2);
    await look('the files');
    await dialog.getByLabel('Mesh files').setInputFiles([meshFile('block.stl', block([0, 0, 0], [size, 9, 9])), meshFile('open.stl', block([0, 0, 0], [size, 9, 8]))]);
    await dialog.getByRole('heading', { name: '2 files have names that parts have already' }).waitFor();
    await look('names that parts have');
    await dialog.getByRole('button', { name: 'New parts, all of them' }).click();
    await answerUnit(page, 'millimetre');
    await closeDialog(page);
    await page.getByRole('region', { name: 'Meshes being added' }).getByRole('button', { name: 'Show' }).click();
    await look('the tray');
    expect(found).toEqual([]);
  });

  it('is accessible in the list with parts selected, a menu open, and a change made', async () => {
    const found: string[] = [];
    await page.goto(places['project'] ?? '');
    await page.getByRole('checkbox', { name: 'Select block', exact: true }).first().click();
    await page.getByRole('button', { name: 'Unit of the selected parts' }).click();
    found.push(...(await checkAccess(page, 'the list, a menu open')));
    await page.getByRole('menuitem', { name: /^inch/ }).click();
    await page.getByText('Unit of 1 part changed to inch.').waitFor();
    found.push(...(await checkAccess(page, 'the list, a change made')));
    await page.keyboard.press('Control+z');
    await page.getByText('Unit of 1 part put back as before.').waitFor();
    expect(found).toEqual([]);
  });
});

describe('every page', () => {
  it.each([1440, 1024, 400])('fits a window %d pixels wide without scrolling sideways', async (width) => {
    const { context, page } = await stage.openBrowser({ viewport: { width, height: 800 } });
    await signIn(page);
    for (const [name, path] of Object.entries(places)) {
      await page.goto(path);
      await page.getByRole('heading').first().waitFor();
      await page.waitForTimeout(200);
      expect(await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth), name).toBeLessThanOrEqual(0);
    }
    await context.close();
  });

  it('of one browser shares one event stream, and another tab takes it over', async () => {
    const { context, page: first } = await stage.openBrowser();
    let streams = 0;
    context.on('request', (request) => {
      if (new URL(request.url()).pathname === '/api/v1/events') streams += 1;
    });
    await signIn(first);
    await first.goto(places['project'] ?? '');
    const tabs = [await context.newPage(), await context.newPage(), await context.newPage()];
    for (const tab of tabs) {
      await tab.goto(places['project'] ?? '');
      await tab.getByRole('heading', { name: 'Reel, mark 2' }).waitFor();
    }
    // Each load of the first tab opened it anew; the other tabs opened none.
    const opened = streams;
    await new Promise((resolve) => setTimeout(resolve, 500));
    expect(opened).toBeLessThanOrEqual(2);
    const rename = async (name: string) => founder.expect('PATCH', `/projects/${(places['project'] ?? '').split('/').at(-1)}`, { name });
    await rename('Reel, mark 3');
    for (const tab of tabs) await tab.getByRole('heading', { name: 'Reel, mark 3' }).waitFor();
    await first.close();
    // Another tab has taken the stream over and the rest still hear of changes.
    await expect.poll(() => streams, { timeout: 10_000 }).toBe(opened + 1);
    await rename('Reel, mark 2');
    for (const tab of tabs) await tab.getByRole('heading', { name: 'Reel, mark 2' }).waitFor();
    await context.close();
  });

  it('asks no host but the app and the storage', () => {
    expect(stage.faults).toEqual([]);
  });
});
