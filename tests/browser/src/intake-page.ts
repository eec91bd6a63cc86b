import type { Locator, Page } from 'playwright-core';
import { password } from '../../support/api-user';
import { environment } from '../../support/environment';

export const storageOrigin = (): string => new URL(environment.storage.endpoint).origin;

/** A part on its way to the storage: of which object, and which of its parts. */
export interface Sent {
  objectKey: string;
  partNumber: number;
}

export function readPartAddress(address: string): Sent {
  const { pathname, searchParams } = new URL(address);
  // /bucket/key: the key itself has slashes.
  return { objectKey: pathname.split('/').slice(2).join('/'), partNumber: Number(searchParams.get('partNumber')) };
}

/** Notes every part that the storage took from this page. */
export function watchSent(page: Page): Sent[] {
  const sent: Sent[] = [];
  page.on('response', (response) => {
    if (response.request().method() === 'PUT' && response.ok() && response.url().startsWith(storageOrigin())) sent.push(readPartAddress(response.url()));
  });
  return sent;
}

export async function signIn(page: Page, email: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.keyboard.press('Enter');
  await page.getByRole('heading', { name: 'Projects' }).waitFor();
}

/** Files and folders of the disk, let go over the middle of the page, as the browser sees a real drop. */
export async function dropOnPage(page: Page, files: readonly string[]): Promise<void> {
  const session = await page.context().newCDPSession(page);
  const { width, height } = page.viewportSize() ?? { width: 1000, height: 800 };
  for (const type of ['dragEnter', 'dragOver', 'drop'] as const) {
    await session.send('Input.dispatchDragEvent', { type, x: width / 2, y: height / 2, data: { items: [], files: [...files], dragOperationsMask: 1 } });
  }
  await session.detach();
}

export const findDialog = (page: Page): Locator => page.getByRole('dialog').filter({ has: page.getByRole('heading', { name: /Add meshes|New file for/ }) });
export const findRow = (page: Page, name: string): Locator => page.getByRole('row').filter({ has: page.getByRole('link', { name, exact: true }) });
export const closeDialog = (page: Page): Promise<void> => findDialog(page).getByRole('button', { name: 'Close', exact: true }).last().click();

export const meshFile = (name: string, bytes: Uint8Array) => ({ name, mimeType: 'model/stl', buffer: Buffer.from(bytes) });

/** Opens the dialog by its button and chooses files in it. */
export async function chooseFiles(page: Page, files: ReturnType<typeof meshFile>[]): Promise<void> {
  await page.getByRole('button', { name: 'Add meshes' }).first().click();
  await findDialog(page).getByLabel('Mesh files').setInputFiles(files);
}

/** Answers the question of a drop. */
export async function answerUnit(page: Page, unit: 'millimetre' | 'inch', density?: string): Promise<void> {
  const dialog = findDialog(page);
  await dialog.getByRole('radio', { name: unit }).check();
  if (density !== undefined) await dialog.getByLabel('Density').fill(density);
  await dialog.getByRole('button', { name: /^(These are|It is in) / }).click();
}
