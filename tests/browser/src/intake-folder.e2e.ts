import path from 'node:path';
import type { Page, Route } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { cleanFileName, type OpenUploads, type PartList, type PartRow, type Upload } from '@masswright/contracts';
import type { ApiUser } from '../../support/api-user';
import { environment } from '../../support/environment';
import { listMixedFiles, writeFolder } from '../../support/mesh-folder';
import { answerUnit, closeDialog, dropOnPage, findDialog, findRow, readPartAddress, signIn, storageOrigin, watchSent, type Sent } from './intake-page';
import { openStage, type Stage } from './stage';

const partBytes = 8 * 1024 * 1024;
const files = listMixedFiles();
const meshes = files.filter(({ kind }) => kind !== 'other');
const nameOf = (place: string) => cleanFileName(place);
/** How a file is called here, by its name and folder as the server keeps them. */
const labelOf = ({ folder, fileName }: { folder: string; fileName: string }) => `${folder}/${fileName}`;

let stage: Stage;
let page: Page;
let engineer: ApiUser;
let projectId: string;
let folder: string;
let sent: Sent[];
let listedBefore: PartRow[];

beforeAll(async () => {
  stage = await openStage();
  engineer = stage.visit();
  const { user } = await engineer.signUp('Ines Marsh', 'Halyard Kites');
  projectId = (await engineer.createProject('Sixty files')).id;
  folder = path.join(environment.dataDir, 'mixed meshes');
  writeFolder(folder, files);
  ({ page } = await stage.openBrowser());
  sent = watchSent(page);
  await signIn(page, user.email);
  await page.goto(`/projects/${projectId}`);
});
afterAll(async () => {
  await stage.close();
});

const listParts = async () => (await engineer.get<PartList>(`/projects/${projectId}/parts?limit=200`)).items;
const labelPlace = (place: string) => labelOf({ folder: path.posix.join('mixed meshes', path.posix.dirname(place)), fileName: nameOf(place) });
const countParts = (bytes: Uint8Array) => Math.max(1, Math.ceil(bytes.length / partBytes));

async function isQuiet(): Promise<boolean> {
  return (await listParts()).every(({ state }) => state !== 'measuring');
}

/** Parts that were sent, by the files that they are of. */
async function describeSent(parts: readonly Sent[]): Promise<string[]> {
  const rows = await stage.database.look<{ key: string; fileName: string; folder: string }>('select object_key as key, file_name as "fileName", folder from uploads');
  const labels = new Map(rows.map((row) => [row.key, labelOf(row)]));
  return parts.map(({ objectKey, partNumber }) => `${labels.get(objectKey)} part ${partNumber}`).sort();
}

/** Lets the first parts of large files and some small files through; all that comes after waits until the page is left. */
async function holdTheRest(): Promise<{ passed: () => { small: number; large: number }; held: () => number }> {
  const passed = { small: 0, large: 0 };
  let held = 0;
  await page.route(`${storageOrigin()}/**`, async (route: Route) => {
    if (route.request().method() !== 'PUT') return route.continue();
    const { objectKey, partNumber } = readPartAddress(route.request().url());
    const [row] = await stage.database.look<{ size: number }>('select size_bytes::float8 as size from uploads where object_key = $1', [objectKey]);
    const isLarge = (row?.size ?? 0) > partBytes;
    // Small files wait only once both large ones have begun, so that the middle is the middle of all kinds.
    if (isLarge ? partNumber > 1 : passed.small >= 20 && passed.large === 2) {
      held += 1;
      return;
    }
    passed[isLarge ? 'large' : 'small'] += 1;
    await route.continue();
  });
  return { passed: () => passed, held: () => held };
}

describe('a folder of sixty mixed files', () => {
  it('is sent from the moment in which it is chosen, without what is no mesh', async () => {
    expect(files).toHaveLength(60);
    const gate = await holdTheRest();
    await page.getByRole('button', { name: 'Add meshes' }).first().click();
    await findDialog(page).getByLabel('Folder of meshes').setInputFiles(folder);
    await page.getByText('5 files that are no meshes by their names were left out.').waitFor();
    await expect.poll(() => gate.passed().large === 2 && gate.passed().small >= 20 && gate.held() >= 3, { timeout: 60_000 }).toBe(true);
    await expect.poll(() => sent.length, { timeout: 30_000 }).toBe(gate.passed().small + gate.passed().large);
  });

  it('has its unit asked, with nothing preselected, sizes for each answer, and no mass anywhere until it is stated', async () => {
    const dialog = findDialog(page);
    await dialog.getByRole('heading', { name: /What unit are these \d+ meshes in/ }).waitFor();
    expect(await dialog.getByRole('radio', { checked: true }).count()).toBe(0);
    const millimetres = dialog.getByRole('row').filter({ has: page.getByRole('radio', { name: 'millimetre' }) });
    // Drum and flywheel are 240 and 600 mm wide: the largest size of this drop.
    await expect.poll(() => millimetres.textContent(), { timeout: 30_000 }).toMatch(/600\s?mm|0\.6\d*\s?m|60\s?cm/);
    await expect.poll(isQuiet, { timeout: 60_000 }).toBe(true);
    const parts = await listParts();
    expect(parts.length).toBeGreaterThan(10);
    expect(parts.filter(({ massKg, sizeM }) => massKg !== null || sizeM !== null)).toEqual([]);
    expect(new Set(parts.map(({ revision }) => revision.setting.lengthUnit))).toEqual(new Set([null]));
  });

  it('asks before the page is left, and stays where the person wants to stay', async () => {
    const asked: string[] = [];
    page.once('dialog', (dialog) => {
      asked.push(dialog.type());
      void dialog.dismiss();
    });
    await page.evaluate(() => setTimeout(() => location.reload()));
    await expect.poll(() => asked).toEqual(['beforeunload']);
    await findDialog(page).getByText(/\d+ being sent/).first().waitFor();
    page.once('dialog', (dialog) => {
      asked.push(dialog.type());
      void dialog.accept();
    });
    await page.reload();
    expect(asked).toEqual(['beforeunload', 'beforeunload']);
    await page.unrouteAll({ behavior: 'ignoreErrors' });
    await page.getByRole('heading', { name: 'Sixty files' }).waitFor();
  });

  it('dropped again, is sent only as far as it is missing', async () => {
    await expect.poll(isQuiet, { timeout: 30_000 }).toBe(true);
    listedBefore = await listParts();
    const known = new Set(listedBefore.map(({ revision }) => labelOf(revision)));
    const hashed = await stage.database.look<{ fileName: string; folder: string }>(`select file_name as "fileName", folder from uploads where state = 'stored' and sha256 is not null`);
    const unhashed = [...known].filter((label) => !hashed.some((row) => labelOf(row) === label));
    const { items } = await engineer.get<OpenUploads>(`/projects/${projectId}/uploads`);
    const open = await Promise.all(items.map(({ id }) => engineer.get<Upload>(`/uploads/${id}`)));
    const wanted = meshes.flatMap(({ place, bytes }) => {
      const label = labelPlace(place);
      if (known.has(label)) return [];
      const stored = open.find((upload) => labelOf(upload) === label)?.storedParts.map(({ partNumber }) => partNumber) ?? [];
      return Array.from({ length: countParts(bytes) }, (_, index) => index + 1).filter((number) => !stored.includes(number)).map((number) => `${label} part ${number}`);
    });
    // Of each large file the first part is there, of small ones the whole or nothing.
    expect(wanted.filter((part) => part.includes('large/'))).toEqual(['mixed meshes/large/drum.stl part 2', 'mixed meshes/large/flywheel.stl part 2', 'mixed meshes/large/flywheel.stl part 3']);

    sent.length = 0;
    await dropOnPage(page, [folder]);
    const dialog = findDialog(page);
    await dialog.getByText(`${known.size - unhashed.length} there already`).first().waitFor({ timeout: 60_000 });
    await answerUnit(page, 'millimetre', '2.7 g/cm3');
    await leaveOutAsked(unhashed.length);
    // Of two files of one name one may have been a part before the page was left: whether the other is its next revision is asked.
    const asNewParts = dialog.getByRole('button', { name: /^(New parts, all of them|A new part)$/ });
    const countAnswered = async () => {
      if (await asNewParts.isVisible()) await asNewParts.click();
      return (await listParts()).length;
    };
    await expect.poll(countAnswered, { timeout: 60_000 }).toBe(meshes.length);
    await expect.poll(isQuiet, { timeout: 60_000 }).toBe(true);
    const resent = (await describeSent(sent)).filter((part) => !unhashed.some((label) => part.startsWith(`${label} part`)));
    expect(resent).toEqual(wanted.sort());
  });

  /** A file that failed before it was hashed can't be known to be the same: the person is asked, and leaves it out. */
  async function leaveOutAsked(count: number): Promise<void> {
    const dialog = findDialog(page);
    if (count === 0) return;
    await dialog.getByRole('button', { name: /^Files, \d+$/ }).click();
    const asked = dialog.getByRole('listitem').filter({ hasText: 'wants your decision' });
    await expect.poll(() => asked.count(), { timeout: 60_000 }).toBe(count);
    while ((await asked.count()) > 0) await asked.first().getByRole('button', { name: /^Cancel / }).click();
  }

  it('ends as one part for each mesh file, the bad ones with their reason, and none twice', async () => {
    await closeDialog(page);
    const parts = await listParts();
    expect(parts.map(({ revision }) => labelOf(revision)).sort()).toEqual(meshes.map(({ place }) => labelPlace(place)).sort());
    expect(parts.every(({ revision }) => revision.letter === 'A')).toBe(true);
    const failed = parts.filter(({ state }) => state === 'failed');
    expect(failed.map(({ revision }) => labelOf(revision)).sort()).toEqual(meshes.filter(({ kind }) => kind === 'bad').map(({ place }) => labelPlace(place)).sort());
    expect(failed.filter(({ revision }) => !revision.run.error?.message)).toEqual([]);
    expect(parts.find(({ revision }) => revision.fileName === 'open.stl')?.soundness?.defensible).toBe(false);
    // The same bytes under two names are measured once, and each says so.
    expect(parts.filter(({ revision }) => revision.fileName.startsWith('twin_')).map(({ sameBytes }) => sameBytes)).toEqual([1, 1]);
    expect(parts.filter(({ revision }) => revision.fileName === 'lever.stl').map(({ name }) => name).sort()).toEqual(['lever (mixed meshes/left)', 'lever (mixed meshes/right)']);
    expect(parts.map(({ name }) => name)).toContain('spindle');
  });

  it('has the masses of a handbook once the unit of all of them is stated in the list', async () => {
    const grid = page.getByRole('grid', { name: 'Parts' });
    await grid.focus();
    await page.keyboard.press('Control+a');
    await page.getByRole('button', { name: 'Unit of the selected parts' }).click();
    await page.getByRole('menuitem', { name: /^millimetre/ }).click();
    await page.getByText(/Unit of \d+ parts changed to millimetre/).waitFor();
    await page.getByRole('button', { name: 'Material of the selected parts' }).click();
    await page.getByLabel('or a density').fill('2.7 g/cm3');
    await page.getByRole('button', { name: 'Set the density' }).click();
    await page.getByText(/Density of \d+ parts changed to/).waitFor();
    const parts = await listParts();
    for (const { place, sides } of meshes) {
      if (!sides) continue;
      // m = ρabc, in kg of mm and 2700 kg/m³.
      const massKg = 2.7e-6 * sides[0] * sides[1] * sides[2];
      const part = parts.find(({ revision }) => labelOf(revision) === labelPlace(place));
      expect((part?.massKg ?? Number.NaN) / massKg, place).toBeCloseTo(1, 6);
    }
    // bracket_01 is 11 × 21 × 6 mm: 2.7 g/cm³ × 1.386 cm³ = 3.7422 g.
    await expect.poll(() => findRow(page, 'bracket_01').textContent()).toContain('3.742');
  });

  it('asked no host but the app and the storage, and broke no promise of the api document', () => {
    expect(stage.faults).toEqual([]);
  });
});
