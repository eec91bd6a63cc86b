import { chromium, type Browser, type Page } from 'playwright-core';
import { password } from '../tests/support/api-user';

const flags = ['--no-sandbox', '--use-angle=swiftshader', '--enable-unsafe-swiftshader', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync', '--disable-quic'];

/** Runs `use` with a page of a browser in which a person has signed in, and closes the browser. */
export async function withSignedInPage<Result>(url: string, email: string, use: (page: Page) => Promise<Result>): Promise<Result> {
  const browser: Browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: flags });
  try {
    const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
    await page.goto(`${url}/sign-in`);
    await page.getByLabel('E-mail').fill(email);
    await page.getByLabel('Password').fill(password);
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: 'Projects' }).waitFor();
    return await use(page);
  } finally {
    await browser.close();
  }
}
