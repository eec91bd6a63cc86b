import { chromium, type Page } from 'playwright-core';
import { ApiUser, password } from '../tests/support/api-user';
import { sphere } from '../tests/support/meshes';
import type { BenchContext } from '../tools/bench/context';

export const needs = ['programs'];

const rounds = 15;
/** The bar of the product: from the last byte stored to the figures on the page, at 5,000 triangles. */
const barMs = 1_000;
const flags = ['--no-sandbox', '--use-angle=swiftshader', '--enable-unsafe-swiftshader', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync', '--disable-quic'];

const quantile = (values: number[], share: number): number => [...values].sort((a, b) => a - b)[Math.min(values.length - 1, Math.floor(values.length * share))] ?? NaN;

async function openProject(page: Page, url: string, email: string, projectName: string): Promise<void> {
  await page.goto(`${url}/sign-in`);
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.keyboard.press('Enter');
  await page.getByRole('link', { name: projectName }).first().click();
  await page.getByRole('heading', { name: projectName }).waitFor();
}

/** A page of the project stands open; files are stored by the api; how long until the page shows the mass of each. */
export async function run({ apiUrl, print }: BenchContext): Promise<void> {
  if (apiUrl === undefined) throw new Error('This benchmark needs the programs.');
  const user = new ApiUser(apiUrl, apiUrl);
  const { user: person } = await user.signUp();
  const project = await user.createProject('Stopwatch');
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: flags });
  try {
    const page = await browser.newPage({ viewport: { width: 1440, height: 900 } });
    await openProject(page, apiUrl, person.email, 'Stopwatch');
    for (const facets of [5_000, 100_000]) {
      const times: number[] = [];
      for (let round = 0; round < rounds; round++) {
        const name = `ball ${facets} ${round}`;
        const upload = await user.send(project.id, `${name}.stl`, sphere(20 + (round + 1) / 64, facets));
        const storedAt = performance.now();
        await user.complete(upload.id);
        await page.getByRole('row').filter({ hasText: name }).filter({ hasText: 'Closed' }).waitFor();
        times.push(performance.now() - storedAt);
      }
      const median = quantile(times, 0.5);
      const bar = facets === 5_000 ? `, ${(median / barMs).toFixed(2)} × the bar of ${barMs} ms` : '';
      print(`${facets} facets, last byte stored to figures on the page: median ${median.toFixed(0)} ms, p95 ${quantile(times, 0.95).toFixed(0)} ms, worst ${Math.max(...times).toFixed(0)} ms over ${rounds}${bar}`);
    }
  } finally {
    await browser.close();
  }
}
