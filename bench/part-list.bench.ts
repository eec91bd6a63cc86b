import pg from 'pg';
import { partSorts, type PartList } from '@masswright/contracts';
import { ApiUser } from '../tests/support/api-user';
import { fillProject, type Look } from '../tests/support/filled-project';
import type { BenchContext } from '../tools/bench/context';
import { withSignedInPage } from './browser-session';

export const needs = ['programs'];

const parts = 10_000;
const others = 190_000;
const rounds = 15;
/** The bar of the product: every answer of the list, at the 95th of a hundred. */
const barMs = 100;

const quantile = (values: number[], share: number): number => [...values].sort((a, b) => a - b)[Math.min(values.length - 1, Math.floor(values.length * share))] ?? NaN;

/** Parts of nineteen other projects as the list knows them: a summary each, without files. */
const insertOthers = `
with project as (insert into projects (organisation_id, name, created_by) select $1, 'Other ' || n, $2 from generate_series(1, 19) n returning id),
p as (insert into parts (organisation_id, project_id, number, name) select $1, project.id, i, 'bracket ' || i from project, generate_series(1, $3::int / 19) i returning id, project_id, number, name)
insert into part_summaries (part_id, organisation_id, project_id, number, name_key, file_key, material_key, search_text, state, changed_at, mass_kg)
select id, $1, project_id, number, name, name || '.stl', 'aluminium 6061-t6', number || E'\\n' || name || E'\\n' || name || E'.stl\\n\\naluminium 6061-t6', 'ready', now(), number from p`;

interface Question {
  name: string;
  query: Record<string, string | number>;
}

function makeQuestions(): Question[] {
  const stretches = [['first', 0], ['middle', parts / 2], ['last', parts - 100]] as const;
  const sorts = partSorts.flatMap((sort) => stretches.map(([where, offset]) => ({ name: `by ${sort}, ${where} stretch`, query: { sort, offset } })));
  return [
    ...sorts,
    { name: 'by mass, descending', query: { sort: 'mass', direction: 'descending' } },
    { name: 'one word', query: { text: 'housing' } },
    { name: 'three words', query: { text: 'housing batch 6061' } },
    { name: 'a word that nothing has', query: { text: 'xylophone' } },
    { name: 'two states', query: { states: 'failed,unit-missing' } },
    { name: 'two states, one word, by name', query: { states: 'ready,failed', text: 'lever', sort: 'name' } },
    { name: 'deleted', query: { deleted: 'true' } },
  ];
}

async function fill(look: Look, applicationUrl: string, user: ApiUser): Promise<string> {
  const { id: projectId } = await user.createProject('Ten thousand');
  const session = user.session;
  if (session === undefined) throw new Error('Nobody signed up.');
  const [organisationId, userId] = [session.organisation.id, session.user.id];
  await fillProject(look, applicationUrl, { organisationId, projectId, userId, count: parts, mixed: true });
  await look(insertOthers, [organisationId, userId, others]);
  // As the server does by itself within a minute of so many new rows.
  await look('vacuum analyze');
  return projectId;
}

/** One change for all ten thousand, its undo, their deletion and their restoration. */
async function measureChanges(user: ApiUser, projectId: string, print: BenchContext['print']): Promise<void> {
  const time = async <Body>(name: string, path: string, body?: unknown): Promise<Body> => {
    const begin = performance.now();
    const answer = await user.expect<Body>('POST', path, body);
    print(`${name} of ${parts} parts: ${((performance.now() - begin) / 1000).toFixed(1)} s`);
    return answer;
  };
  const all = { filter: {}, except: [] };
  const { id } = await time<{ id: string }>('a change', `/projects/${projectId}/setting-changes`, { parts: all, change: { lengthUnit: 'inch', material: { id: 'pla' } } });
  await time('taking it back', `/setting-changes/${id}/undo`);
  await time('the deletion', `/projects/${projectId}/part-deletions`, { parts: all });
  await time('the restoration', `/projects/${projectId}/part-restorations`, { parts: all });
}

/** The most rows that the page may hold, and the longest task while scrolling. */
const barRows = 60;
const barTaskMs = 100;

/** Turns the wheel over the list as a person does who looks for something: how long tasks of the page are (the browser tells those over 50 ms), and how many rows it holds. */
async function measureScrolling(url: string, user: ApiUser, projectId: string, print: BenchContext['print']): Promise<void> {
  await withSignedInPage(url, user.session?.user.email ?? '', async (page) => {
    await page.goto(`${url}/projects/${projectId}`);
    await page.getByRole('row').nth(10).waitFor();
    // What the page does by itself after it has opened is not scrolling.
    await page.waitForTimeout(2_000);
    await page.evaluate(() => {
      const tasks: number[] = [];
      Object.assign(window, { tasks });
      new PerformanceObserver((list) => tasks.push(...list.getEntries().map(({ duration }) => duration))).observe({ type: 'longtask' });
    });
    let rows = 0;
    await page.mouse.move(700, 500);
    for (let turn = 0; turn < 120; turn++) {
      await page.mouse.wheel(0, (turn % 30 === 29 ? -40_000 : 400) * ((turn % 7) + 1));
      await page.waitForTimeout(60);
      rows = Math.max(rows, await page.evaluate(() => document.querySelectorAll('[role=row]').length));
    }
    await page.waitForTimeout(500);
    const tasks = await page.evaluate(() => (window as unknown as { tasks: number[] }).tasks);
    const longest = Math.max(0, ...tasks);
    print(`scrolling through ${parts} rows, 120 turns of the wheel: ${tasks.length} tasks over 50 ms, the longest ${longest.toFixed(0)} ms, ${(longest / barTaskMs).toFixed(2)} × the bar; at most ${rows} rows in the page, ${(rows / barRows).toFixed(2)} × the bar of ${barRows}`);
  });
}

/** A project of ten thousand parts in an organisation of two hundred thousand: how long the list's answers take, with their counts. */
export async function run({ env, apiUrl, print }: BenchContext): Promise<void> {
  const [adminUrl, applicationUrl] = [env['TEST_DATABASE_ADMIN_URL'], env['TEST_DATABASE_URL']];
  if (apiUrl === undefined || adminUrl === undefined || applicationUrl === undefined) throw new Error('This benchmark needs the programs.');
  const pool = new pg.Pool({ connectionString: Object.assign(new URL(adminUrl), { pathname: new URL(applicationUrl).pathname }).href, max: 1 });
  const look: Look = async <Row extends Record<string, unknown>>(sql: string, values: unknown[] = []) => (await pool.query<Row>(sql, values)).rows;
  try {
    const user = new ApiUser(apiUrl, apiUrl);
    await user.signUp();
    const projectId = await fill(look, applicationUrl, user);
    const worst = { name: '', ms: 0 };
    const all: number[] = [];
    for (const { name, query } of makeQuestions()) {
      const address = `/projects/${projectId}/parts?${new URLSearchParams(Object.entries(query).map(([key, value]): [string, string] => [key, String(value)])).toString()}`;
      const times: number[] = [];
      // The first two warm the caches, as the page that is open has.
      for (let round = -2; round < rounds; round++) {
        const begin = performance.now();
        const response = await fetch(`${apiUrl}/api/v1${address}`, { headers: { Cookie: user.cookie ?? '' } });
        const list = (await response.json()) as PartList;
        if (round >= 0) times.push(performance.now() - begin);
        if (!response.ok || list.items.length > 100) throw new Error(`${address} → ${response.status}`);
      }
      all.push(...times);
      const p95 = quantile(times, 0.95);
      if (p95 > worst.ms) Object.assign(worst, { name, ms: p95 });
      print(`${name}: median ${quantile(times, 0.5).toFixed(0)} ms, p95 ${p95.toFixed(0)} ms, ${(p95 / barMs).toFixed(2)} × the bar of ${barMs} ms`);
    }
    await measureScrolling(apiUrl, user, projectId, print);
    await measureChanges(user, projectId, print);
    print(`all ${all.length} answers: median ${quantile(all, 0.5).toFixed(0)} ms, p95 ${quantile(all, 0.95).toFixed(0)} ms, ${(quantile(all, 0.95) / barMs).toFixed(2)} × the bar; worst p95 ${worst.ms.toFixed(0)} ms (${worst.name}), ${(worst.ms / barMs).toFixed(2)} × the bar`);
  } finally {
    await pool.end();
  }
}
