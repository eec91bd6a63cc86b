import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { environment } from '../../support/environment';
import { waitForMail } from '../../support/mail';
import { block } from '../../support/meshes';
import { password } from '../../support/api-user';
import { openStage, type Stage } from './stage';

let stage: Stage;

beforeAll(async () => {
  stage = await openStage();
});
afterAll(async () => {
  await stage.close();
});

describe('inviting a colleague', () => {
  it('goes by mail: the colleague reads it in the inbox page, signs in by its link, and as a reader can change nothing', async () => {
    const founder = stage.visit();
    const { user } = await founder.signUp('Ines Marsh', 'Halyard Kites');
    const project = await founder.createProject('Reel, mark 2');
    const part = await founder.waitForRun((await founder.addMesh(project.id, 'block.stl', block([0, 0, 0], [40, 30, 20]))).id);
    const invited = `${randomUUID()}@halyard.example`;

    const { page: office } = await stage.openBrowser();
    await office.goto('/sign-in');
    await office.getByLabel('E-mail').fill(user.email);
    await office.getByLabel('Password').fill(password);
    await office.keyboard.press('Enter');
    await office.getByRole('link', { name: 'People' }).click();
    await office.getByLabel('E-mail').fill(invited);
    await office.getByLabel('Role', { exact: true }).last().selectOption({ label: 'Reader' });
    await office.getByRole('button', { name: 'Send the invitation' }).click();
    await office.getByText(invited).first().waitFor();

    // The inbox page is another program's; the person's browser opens the link from there.
    const { context, page: home } = await stage.openBrowser();
    const inbox = await context.newPage();
    const before = stage.faults.length;
    await expect
      .poll(
        async () => {
          await inbox.goto(environment.mailInboxUrl);
          return inbox.getByText(invited).count();
        },
        { timeout: 20_000 },
      )
      .toBeGreaterThan(0);
    await inbox.getByRole('link').filter({ hasText: /Halyard Kites/ }).first().click();
    const link = inbox.getByRole('link', { name: /\/invitation#token=/ }).first();
    const href = (await link.getAttribute('href')) ?? '';
    // The inbox is a host of its own; going there is what the test does, not the app.
    stage.faults.splice(before);
    await home.goto(href);
    await home.getByLabel('Your name').fill('Ruben Achterberg');
    await home.getByLabel('Password').fill(password);
    await home.keyboard.press('Enter');
    await home.getByRole('heading', { name: 'Projects' }).waitFor();
    expect(new URL(home.url()).hash).toBe('');

    expect(await home.getByRole('button', { name: /new project|make a project/i }).count()).toBe(0);
    await home.getByRole('link', { name: /Reel, mark 2/ }).first().click();
    await home.getByRole('link', { name: 'block', exact: true }).waitFor();
    expect(await home.getByRole('button', { name: /add meshes|rename/i }).count()).toBe(0);
    await home.getByRole('link', { name: 'block', exact: true }).click();
    await home.getByRole('heading', { name: 'Figures' }).waitFor();
    const main = home.getByRole('main');
    // Which figure's doubt is shown is a choice of the reader's own, and changes nothing.
    expect(await main.locator('input, select:not([id="doubt-figure"]), textarea').count()).toBe(0);
    expect(await main.getByRole('button', { name: /rename|undo/i }).count()).toBe(0);
    await home.getByRole('link', { name: 'People' }).click();
    await home.getByText(invited).first().waitFor();
    expect(await home.getByRole('button', { name: /remove|invit/i }).count()).toBe(0);

    // Whatever the page shows, the server refuses.
    const status = await home.evaluate(async (id) => {
      const response = await fetch(`/api/v1/parts/${id}/setting`, { method: 'PATCH', headers: { 'Content-Type': 'application/json' }, body: JSON.stringify({ version: 1, densityKgM3: 1 }) });
      return response.status;
    }, part.id);
    expect(status).toBe(403);

    // The administrator removes them: their page ends at once.
    await office.reload();
    await office.getByRole('row').filter({ hasText: invited }).getByRole('button', { name: /remove/i }).click();
    await office.getByRole('dialog').getByRole('button', { name: /remove/i }).click();
    await home.waitForURL('**/sign-in**');
    expect(stage.faults).toEqual([]);
  });

  it('sets a forgotten password by mail', async () => {
    const person = stage.visit();
    const { user } = await person.signUp('Tomas Weir');
    const { page } = await stage.openBrowser();
    await page.goto('/sign-in');
    await page.getByRole('link', { name: /forgotten/i }).click();
    // Both pages have a field for the address; the next one must be there before it is filled in.
    await page.waitForURL('**/forgotten-password');
    await page.getByLabel('Password').waitFor({ state: 'detached' });
    await page.getByLabel('E-mail').fill(user.email);
    await page.keyboard.press('Enter');
    await page.getByText(/on its way/).waitFor();
    const mail = await waitForMail(user.email);
    await page.goto(/https?:\/\/\S+/.exec(mail.text)?.[0] ?? '');
    await page.getByLabel(/password/i).first().fill('an entirely new password');
    await page.keyboard.press('Enter');
    await page.waitForURL('**/sign-in**');
    await page.getByLabel('E-mail').fill(user.email);
    await page.getByLabel('Password').fill('an entirely new password');
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: 'Projects' }).waitFor();
  });
});
