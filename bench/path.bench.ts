import { ApiUser } from '../tests/support/api-user';
import { sphere } from '../tests/support/meshes';
import type { BenchContext } from '../tools/bench/context';
import { withSignedInPage } from './browser-session';

export const needs = ['programs'];

/** The bars of the product: from the last byte stored to the figures on the page. */
const tasks = [
  { facets: 5_000, rounds: 15, barMs: 1_000 },
  { facets: 100_000, rounds: 9 },
  { facets: 1_000_000, rounds: 3, barMs: 4_000 },
] as const satisfies { facets: number; rounds: number; barMs?: number }[];

const quantile = (values: number[], share: number): number => [...values].sort((a, b) => a - b)[Math.min(values.length - 1, Math.floor(values.length * share))] ?? NaN;

/** A page of the project stands open; files are stored by the api; how long until the page shows the figures of each. What is examined after that comes later. */
export async function run({ apiUrl, print }: BenchContext): Promise<void> {
  if (apiUrl === undefined) throw new Error('This benchmark needs the programs.');
  const user = new ApiUser(apiUrl, apiUrl);
  const { user: person } = await user.signUp();
  await withSignedInPage(apiUrl, person.email, async (page) => {
    for (const { facets, rounds, ...task } of tasks) {
      // One each, so that every row is in view.
      const project = await user.createProject(`Stopwatch ${facets}`);
      await page.goto(`${apiUrl}/projects/${project.id}`);
      await page.getByRole('heading', { name: project.name }).waitFor();
      const times: number[] = [];
      for (let round = 0; round < rounds; round++) {
        const name = `ball ${facets} ${round}`;
        const upload = await user.send(project.id, `${name}.stl`, sphere(20 + (round + 1) / 64, facets));
        const storedAt = performance.now();
        const { id } = await user.complete(upload.id);
        await page.getByRole('row').filter({ hasText: name }).filter({ hasText: 'Closed' }).waitFor();
        times.push(performance.now() - storedAt);
        // The next one has the worker to itself.
        await user.waitForRun(id, 120_000);
      }
      const median = quantile(times, 0.5);
      const bar = 'barMs' in task ? `, ${(median / task.barMs).toFixed(2)} × the bar of ${task.barMs} ms` : '';
      print(`${facets} facets, last byte stored to figures on the page: median ${median.toFixed(0)} ms, p95 ${quantile(times, 0.95).toFixed(0)} ms, worst ${Math.max(...times).toFixed(0)} ms over ${rounds}${bar}`);
    }
  });
}
