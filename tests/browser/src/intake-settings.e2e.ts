import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Part, PartList, PartRow } from '@masswright/contracts';
import type { ApiUser } from '../../support/api-user';
import { block, type Point } from '../../support/meshes';
import { chooseFiles, closeDialog, findDialog, findRow, meshFile, signIn } from './intake-page';
import { openStage, type Stage } from './stage';

const sides: Record<'housing' | 'lever' | 'yoke', Point> = { housing: [40, 30, 20], lever: [10, 20, 30], yoke: [20, 20, 20] };
let stage: Stage;
let page: Page;
let engineer: ApiUser;
let projectId: string;

beforeAll(async () => {
  stage = await openStage();
  engineer = stage.visit();
  const { user } = await engineer.signUp('Ines Marsh', 'Halyard Kites');
  projectId = (await engineer.createProject('Reel, mark 2')).id;
  // Stated wrong: they are millimetres.
  for (const [name, size] of Object.entries(sides)) await engineer.waitForRun((await engineer.addMesh(projectId, `${name}.stl`, block([0, 0, 0], size), { lengthUnit: 'inch', densityKgM3: 2700 })).id);
  ({ page } = await stage.openBrowser());
  await signIn(page, user.email);
  await openList();
});
afterAll(async () => {
  await stage.close();
});

async function openList(): Promise<void> {
  await page.goto(`/projects/${projectId}`);
  await page.getByRole('grid', { name: 'Parts' }).waitFor();
}
async function readRow(name: string): Promise<PartRow> {
  const { items } = await engineer.get<PartList>(`/projects/${projectId}/parts?limit=200`);
  const row = items.find((one) => one.name === name);
  if (!row) throw new Error(`There is no part ${name}.`);
  return row;
}
const settingOf = async (name: string) => (await readRow(name)).revision.setting;
async function select(...names: string[]): Promise<void> {
  await page.getByRole('grid', { name: 'Parts' }).focus();
  await page.keyboard.press('Escape');
  for (const name of names) await page.getByRole('checkbox', { name: `Select ${name}` }).click();
  await page.getByText(`${names.length} selected`).waitFor();
}
async function choose(button: string, item: RegExp): Promise<void> {
  await page.getByRole('button', { name: button }).click();
  await page.getByRole('menuitem', { name: item }).click();
}

describe('a unit that was stated wrong', () => {
  it('is mended on the part’s page: the figures follow at once, and the record says who stated it and when', async () => {
    await findRow(page, 'housing').getByRole('link').first().click();
    const figures = page.getByRole('region', { name: 'Figures' });
    // 64.8 g × 25.4³: as inches it has the mass of a car.
    await expect.poll(() => figures.textContent()).toMatch(/1.?061\.8/);
    const source = page.getByRole('region', { name: 'Source' });
    await source.getByLabel('Unit').selectOption('millimetre');
    await expect.poll(() => figures.textContent()).toContain('64.8');
    await page.getByText('Saved', { exact: true }).waitFor();
    await page.reload();
    await expect.poll(() => source.textContent()).toMatch(/stated by Ines Marsh, .*\d{2}:\d{2}/);
    expect((await settingOf('housing')).unitStated).toMatchObject({ by: 'Ines Marsh' });
  });

  it('is mended for many in the list, and each of them records it', async () => {
    await openList();
    await select('lever', 'yoke');
    await choose('Unit of the selected parts', /^millimetre/);
    await page.getByText('Unit of 2 parts changed to millimetre.').waitFor();
    // ρabc: 2.7e-3 g/mm³ × 6000 mm³ and × 8000 mm³.
    await expect.poll(() => findRow(page, 'lever').textContent()).toContain('16.20');
    await expect.poll(() => findRow(page, 'yoke').textContent()).toContain('21.60');
    expect((await settingOf('lever')).unitStated).toMatchObject({ by: 'Ines Marsh' });
  });
});

describe('a change of several parts', () => {
  it('of the material is taken back by one press of the button', async () => {
    await select('lever', 'yoke');
    await page.getByRole('button', { name: 'Material of the selected parts' }).click();
    const picker = page.getByRole('combobox', { name: 'Material for the selected parts' });
    await picker.fill('6061');
    await picker.press('Enter');
    await page.getByText(/Material of 2 parts changed to Aluminium 6061/).waitFor();
    expect((await settingOf('yoke')).material).toMatchObject({ id: 'al-6061-t6' });
    await page.getByRole('button', { name: /^Undo/ }).click();
    await page.getByText('Material of 2 parts put back as before.').waitFor();
    for (const name of ['lever', 'yoke']) expect(await settingOf(name)).toMatchObject({ material: null, densityKgM3: 2700 });
  });

  it('of the axis and of the unit is taken back by its key, and done again', async () => {
    await select('housing', 'lever', 'yoke');
    await choose('Axis of the selected parts', /X/);
    await page.getByText(/Axis of 3 parts changed to/).waitFor();
    expect((await settingOf('lever')).axis).toEqual({ kind: 'mesh', along: 'x' });
    await page.keyboard.press('Control+z');
    await page.getByText('Axis of 3 parts put back as before.').waitFor();
    for (const name of Object.keys(sides)) expect((await settingOf(name)).axis).toEqual({ kind: 'mesh', along: 'z' });

    await choose('Unit of the selected parts', /^centimetre/);
    await page.getByText('Unit of 3 parts changed to centimetre.').waitFor();
    await page.keyboard.press('Control+z');
    await page.getByText('Unit of 3 parts put back as before.').waitFor();
    await page.keyboard.press('Control+Shift+z');
    await page.getByText('Unit of 3 parts changed to centimetre.').waitFor();
    expect((await settingOf('yoke')).lengthUnit).toBe('cm');
    await page.keyboard.press('Control+z');
    await page.getByText('Unit of 3 parts put back as before.').waitFor();
    await expect.poll(() => findRow(page, 'lever').textContent()).toContain('16.20');
    expect((await settingOf('yoke')).lengthUnit).toBe('mm');
  });
});

describe('files of names that parts have', () => {
  it('are offered as next revisions, with the reason, and decided for all at once', async () => {
    // The same bodies, written in inches by another program.
    const inInches = ([a, b, c]: Point): Uint8Array => block([0, 0, 0], [a / 25.4, b / 25.4, c / 25.4]);
    await chooseFiles(page, [meshFile('lever.stl', inInches(sides.lever)), meshFile('yoke.stl', inInches(sides.yoke))]);
    const dialog = findDialog(page);
    await dialog.getByRole('heading', { name: '2 files have names that parts have already' }).waitFor();
    expect((await readRow('lever')).revision.letter).toBe('A');
    await dialog.getByLabel('Reason for the revision').fill('boss 1 mm longer');
    await dialog.getByRole('button', { name: 'Next revisions, all of them' }).click();
    await expect.poll(async () => (await readRow('yoke')).revision.letter, { timeout: 20_000 }).toBe('B');
    await closeDialog(page);
    const { revisions } = await engineer.get<Part>(`/parts/${(await readRow('lever')).id}`);
    expect(revisions.map(({ letter, reason }) => [letter, reason])).toEqual([['B', 'boss 1 mm longer'], ['A', '']]);
  });

  it('have their unit asked again where the volume fits another one, and each answer is taken', async () => {
    const button = (name: string) => page.getByRole('button', { name });
    await button('Yes, inches: lever').click({ timeout: 30_000 });
    await expect.poll(() => findRow(page, 'lever').textContent()).toContain('16.20');
    await button('Keep millimetres: yoke').click();
    await expect.poll(async () => (await readRow('yoke')).state).toBe('ready');
    expect([(await settingOf('lever')).lengthUnit, (await settingOf('yoke')).lengthUnit]).toEqual(['inch', 'mm']);
  });
});

describe('a file that could not be measured', () => {
  it('says why in its row and on its page, can be measured again, and is replaced by another', async () => {
    await chooseFiles(page, [meshFile('pawl.stl', block([0, 0, 0], [9, 9, 9]).slice(0, 400))]);
    await expect.poll(() => findRow(page, 'pawl').textContent({ timeout: 1_000 }).catch(() => ''), { timeout: 30_000 }).toContain('cut off');
    await closeDialog(page);
    const again = page.waitForResponse((response) => response.request().method() === 'POST' && response.url().endsWith('/run'));
    await findRow(page, 'pawl').getByRole('button', { name: 'Measure again: pawl' }).click();
    expect((await again).ok()).toBe(true);
    await expect.poll(async () => (await readRow('pawl')).state, { timeout: 20_000 }).toBe('failed');
    await findRow(page, 'pawl').getByRole('link').first().click();
    await page.getByText('This file could not be measured.').waitFor();
    await page.getByRole('button', { name: 'Replace the file' }).first().click();
    await findDialog(page).getByLabel('Mesh files').setInputFiles([meshFile('pawl mended.stl', block([0, 0, 0], [9, 9, 9]))]);
    await expect.poll(async () => [(await readRow('pawl')).revision.letter, (await readRow('pawl')).revision.run.state], { timeout: 20_000 }).toEqual(['B', 'done']);
  });
});

describe('a part that was deleted', () => {
  it('is gone from the list, stands among the deleted ones, and is brought back', async () => {
    await openList();
    await select('housing');
    await page.getByRole('toolbar', { name: 'With the selected parts' }).getByRole('button', { name: 'Delete' }).click();
    await page.getByText('1 part deleted; restorable for 30 days.').waitFor();
    await expect.poll(() => findRow(page, 'housing').count()).toBe(0);
    await page.getByRole('button', { name: /^Deleted 1/ }).click();
    await findRow(page, 'housing').waitFor();
    await select('housing');
    await page.getByRole('button', { name: 'Restore' }).click();
    await page.getByText('1 part restored.').waitFor();
    await page.getByRole('button', { name: /^All\b/ }).click();
    await findRow(page, 'housing').waitFor();
  });

  it('and all of this asked no host but the app and the storage, and broke no promise of the api document', () => {
    expect(stage.faults).toEqual([]);
  });
});
