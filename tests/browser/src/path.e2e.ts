import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import { block, sphere } from '../../support/meshes';
import { password } from '../../support/api-user';
import { answerUnit, chooseFiles, closeDialog, meshFile } from './intake-page';
import { openStage, type Stage } from './stage';

let stage: Stage;
let page: Page;

beforeAll(async () => {
  stage = await openStage();
  ({ page } = await stage.openBrowser());
});
afterAll(async () => {
  await stage.close();
});

/** The first number in a text, thin spaces taken out. */
const numberIn = (text: string | null): number => Number(/-?\d[\d\u2009]*\.?\d*/.exec(text ?? '')?.[0].replaceAll('\u2009', '') ?? Number.NaN);

describe('the whole path as a person goes it', () => {
  const email = `${randomUUID()}@halyard.example`;

  it('signs up, makes a project, and is told what comes next', async () => {
    await page.goto('/');
    await page.waitForURL('**/sign-in**');
    await page.getByRole('link', { name: /new organisation/i }).click();
    await page.getByLabel('Organisation').fill('Halyard Kites');
    await page.getByLabel('Your name').fill('Ines Marsh');
    await page.getByLabel('E-mail').fill(email);
    await page.getByLabel('Password').fill(password);
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: 'Projects' }).waitFor();
    await page.getByRole('button', { name: /project/i }).first().click();
    await page.getByLabel('Name').fill('Reel, mark 2');
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: 'Reel, mark 2' }).waitFor();
  });

  it('adds a real binary STL with its unit and density, and reads the handbook’s numbers seconds later', async () => {
    await chooseFiles(page, [meshFile('block.stl', block([0, 0, 0], [40, 30, 20]))]);
    await answerUnit(page, 'millimetre', '2.7 g/cm3');
    await closeDialog(page);
    await page.getByRole('link', { name: 'block', exact: true }).click();
    await page.getByRole('heading', { name: 'Figures' }).waitFor();
    // m = ρabc = 64.8 g; Ix = m(b² + c²)/12, Iy = m(a² + c²)/12, Iz = m(a² + b²)/12 in kg·mm²: handbook, from memory.
    const figures = page.getByRole('region', { name: 'Figures' });
    await expect.poll(async () => numberIn(await figures.locator('dd').first().textContent().catch(() => null)), { timeout: 20_000 }).toBeCloseTo(64.8, 3);
    const text = (await figures.textContent()) ?? '';
    for (const moment of ['7.02', '10.8', '13.5']) expect(text).toContain(moment);
    for (const coordinate of ['20.0000', '15.0000', '10.0000']) expect(text).toContain(coordinate);
    expect(text).toContain('kg·mm² about the centre of mass, axes of the mesh frame');
    expect(text).toContain('-∫xy dm');
  });

  it('chooses an axis, a speed and a time, and reads torque and stored energy with their caution', async () => {
    const section = page.getByRole('region', { name: 'Axis and torque' });
    await section.getByRole('radio', { name: 'Mesh axis X' }).check();
    await section.getByLabel('Speed in r/min').fill('1500');
    await section.getByLabel('Time in s').fill('0.4');
    // I = 7.02e-6 kg·m², ω = 157.0796 rad/s: τ = Iω/t = 2.7567e-3 N·m, E = Iω²/2 = 0.086606 J: by hand.
    await expect.poll(async () => section.textContent()).toContain('2.7567 N·mm');
    expect(await section.textContent()).toContain('0.086606 J');
    expect(await section.textContent()).toContain('ISO 12100');
  });

  it('changes the density: the figures follow at once, and are there after a reload', async () => {
    const source = page.getByRole('region', { name: 'Source' });
    await source.getByLabel('Density').fill('7850 kg/m3');
    await source.getByLabel('Density').press('Enter');
    const figures = page.getByRole('region', { name: 'Figures' });
    await expect.poll(async () => figures.textContent()).toContain('188.4');
    await page.getByText('Saved', { exact: true }).waitFor();
    await page.reload();
    await expect.poll(async () => figures.textContent()).toContain('188.4');
  });

  it('takes the change back by its key', async () => {
    await page.getByRole('region', { name: 'Source' }).getByLabel('Density').fill('1 g/cm3');
    await page.getByRole('region', { name: 'Source' }).getByLabel('Density').press('Enter');
    const figures = page.getByRole('region', { name: 'Figures' });
    await expect.poll(async () => figures.textContent()).toContain('24.0');
    await page.getByRole('heading', { name: 'Figures' }).click();
    await page.keyboard.press('Control+z');
    await expect.poll(async () => figures.textContent()).toContain('188.4');
  });

  it('asked no host but the app and the storage, and broke no promise of the api document', () => {
    expect(stage.faults).toEqual([]);
  });
});

describe('several files at once', () => {
  it('good ones become parts; bad ones stay in the list with their reason, through a reload in the midst', async () => {
    await page.getByRole('link', { name: 'Reel, mark 2' }).first().click();
    const good = block([0, 0, 0], [1, 2, 3]);
    await chooseFiles(page, [
      meshFile('large.stl', sphere(30, 300_000)),
      meshFile('good.stl', good),
      meshFile('cut.stl', good.slice(0, 400)),
      meshFile('letter.stl', new TextEncoder().encode('Dear Sir or Madam')),
      meshFile('open.stl', (() => {
        const bytes = good.slice(0, good.length - 50);
        new DataView(bytes.buffer).setUint32(80, 11, true);
        return bytes;
      })()),
    ]);
    await answerUnit(page, 'inch');
    await page.getByText('All are sent.').waitFor({ timeout: 60_000 });
    // Should something that was stated still be on its way, the page asks before it is left.
    page.once('dialog', (dialog) => void dialog.accept());
    await page.reload();
    const row = (name: string) => page.getByRole('row').filter({ has: page.getByRole('link', { name, exact: true }) });
    await expect.poll(async () => row('large').textContent(), { timeout: 30_000 }).toContain('Closed');
    await expect.poll(async () => row('cut').textContent(), { timeout: 30_000 }).toContain('cut off');
    await expect.poll(async () => row('letter').textContent(), { timeout: 30_000 }).toContain('Not measured');
    await expect.poll(async () => row('open').textContent(), { timeout: 30_000 }).toContain('Open');
    await row('open').getByRole('link').first().click();
    await page.getByText('No figures.').waitFor();
    expect(await page.getByRole('region', { name: 'Figures' }).textContent()).toContain('open at 3 edges');
    await page.goBack();
    await row('cut').getByRole('link').first().click();
    await page.getByText(/cut off/).first().waitFor();
  });
});
