import type { Page, Route } from 'playwright-core';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { PartList } from '@masswright/contracts';
import type { ApiUser } from '../../support/api-user';
import { block, sphere } from '../../support/meshes';
import { chooseFiles, closeDialog, findDialog, meshFile, signIn, storageOrigin, watchSent, type Sent } from './intake-page';
import { openStage, type Stage } from './stage';

let stage: Stage;
let page: Page;
let engineer: ApiUser;
let projectId: string;
let sent: Sent[];
let shapes = 0;

beforeAll(async () => {
  stage = await openStage();
  engineer = stage.visit();
  const { user } = await engineer.signUp('Ines Marsh', 'Halyard Kites');
  ({ page } = await stage.openBrowser());
  sent = watchSent(page);
  await signIn(page, user.email);
});
beforeEach(async () => {
  projectId = (await engineer.createProject()).id;
  await page.goto(`/projects/${projectId}`);
  sent.length = 0;
});
afterAll(async () => {
  await stage.close();
});

const small = (name: string) => meshFile(name, block([0, 0, 0], [10, 20, 30 + ++shapes]));
const row = (name: string) => findDialog(page).getByRole('listitem').filter({ hasText: name });
const press = (name: string) => findDialog(page).getByRole('button', { name, exact: true }).click();
const openFiles = () => findDialog(page).getByRole('button', { name: /^Files, \d+$/ }).click();
const countParts = async () => (await engineer.get<PartList>(`/projects/${projectId}/parts`)).total;
const states = async () => (await stage.database.look<{ state: string }>('select state from uploads where project_id = $1 order by file_name', [projectId])).map(({ state }) => state);

/** Everything that goes to the storage waits, until it is let go; what a page took back meanwhile is passed over. */
async function holdStorage(): Promise<{ count: () => number; letGo: () => Promise<void> }> {
  const held: Route[] = [];
  await page.route(`${storageOrigin()}/**`, (route) => void held.push(route));
  return {
    count: () => held.length,
    letGo: async () => {
      await page.unroute(`${storageOrigin()}/**`);
      for (const route of held) await route.continue().catch(() => undefined);
    },
  };
}

describe('a file on its way', () => {
  it('is paused, sends nothing meanwhile, and goes on to its end', async () => {
    const gate = await holdStorage();
    await chooseFiles(page, [meshFile('flywheel.stl', sphere(300, 200_000)), small('rib.stl')]);
    await openFiles();
    await expect.poll(gate.count, { timeout: 20_000 }).toBe(3);
    await press('Pause flywheel.stl');
    await expect.poll(() => row('flywheel.stl').textContent()).toContain('Paused');
    await gate.letGo();
    await expect.poll(() => row('rib.stl').textContent(), { timeout: 30_000 }).toContain('Measured');
    expect(sent).toHaveLength(1);
    expect(await row('flywheel.stl').textContent()).toContain('Paused');
    await press('Continue flywheel.stl');
    await expect.poll(() => row('flywheel.stl').textContent(), { timeout: 60_000 }).toContain('Measured');
    expect(sent).toHaveLength(3);
    expect(await countParts()).toBe(2);
    await closeDialog(page);
  });

  it('is cancelled by itself, and nothing of it stays', async () => {
    const gate = await holdStorage();
    await chooseFiles(page, [small('a.stl'), small('b.stl')]);
    await openFiles();
    await expect.poll(gate.count, { timeout: 20_000 }).toBe(2);
    await press('Cancel a.stl');
    await expect.poll(() => row('a.stl').textContent()).toContain('Cancelled');
    await gate.letGo();
    await expect.poll(() => row('b.stl').textContent(), { timeout: 30_000 }).toContain('Measured');
    await expect.poll(states).toEqual(['cancelled', 'stored']);
    expect(await countParts()).toBe(1);
    await closeDialog(page);
  });

  it('is cancelled with all others', async () => {
    const gate = await holdStorage();
    await chooseFiles(page, [small('a.stl'), small('b.stl'), small('c.stl')]);
    await expect.poll(gate.count, { timeout: 20_000 }).toBe(3);
    await press('Cancel all');
    await gate.letGo();
    await expect.poll(states).toEqual(['cancelled', 'cancelled', 'cancelled']);
    expect(sent).toEqual([]);
    expect(await countParts()).toBe(0);
    await closeDialog(page);
  });

  it('that the storage did not take says so, is sent again on demand, and is one part', async () => {
    await page.route(`${storageOrigin()}/**`, (route) => route.abort('connectionrefused'));
    await chooseFiles(page, [small('pawl.stl')]);
    await openFiles();
    await expect.poll(() => row('pawl.stl').textContent(), { timeout: 60_000 }).toMatch(/Not sent.*The connection to the storage was lost/);
    await page.unroute(`${storageOrigin()}/**`);
    await press('Try again: pawl.stl');
    await expect.poll(() => row('pawl.stl').textContent(), { timeout: 30_000 }).toContain('Measured');
    expect(sent).toHaveLength(1);
    expect(await countParts()).toBe(1);
    expect(await states()).toEqual(['stored']);
    await closeDialog(page);
  });

  it('and all of this asked no host but the app and the storage, and broke no promise of the api document', () => {
    expect(stage.faults).toEqual([]);
  });
});
