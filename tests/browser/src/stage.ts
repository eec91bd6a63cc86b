import { spawn } from 'node:child_process';
import path from 'node:path';
import { chromium, type Browser, type BrowserContext, type BrowserContextOptions, type Page } from 'playwright-core';
import { programEnvironment } from '../../support/api';
import { checkAgainstDocument } from '../../support/api-document';
import { ApiUser } from '../../support/api-user';
import { environment } from '../../support/environment';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';
import { startTestWorker, type TestWorker } from '../../support/worker';
import { isPortFree } from '../../../tools/services/ports.mjs';

export interface Stage {
  url: string;
  database: TestDatabase;
  browser: Browser;
  /** A person at a browser of their own. What their pages do wrong is collected in `faults`. */
  openBrowser: (options?: BrowserContextOptions) => Promise<{ context: BrowserContext; page: Page }>;
  /** A person at the api, for what a test only needs to be there. */
  visit: () => ApiUser;
  /** Requests to foreign hosts, errors on the console, uncaught errors, answers that differ from the api document. */
  faults: string[];
  /** What the worker said, for finding out why something did not come. */
  workerLog: () => string;
  close: () => Promise<void>;
}

const flags = ['--no-sandbox', '--use-angle=swiftshader', '--enable-unsafe-swiftshader', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync', '--disable-quic'];

/** The storage lets pages of these ports in. */
async function findPagePort(): Promise<number> {
  for (const port of environment.pagePorts) if (await isPortFree(port)) return port;
  throw new Error('Every port for pages is taken.');
}

/** The built app as `npm start` serves it, with a worker, a database of its own and a real browser. */
export async function openStage(): Promise<Stage> {
  const database = await createTestDatabase();
  const port = await findPagePort();
  const url = `http://127.0.0.1:${port}`;
  const variables = programEnvironment(database, port);
  const api = spawn(process.execPath, ['--enable-source-maps', path.join(environment.buildDir, 'apps/api/main.js')], {
    env: { PATH: process.env['PATH'], ...variables, WEB_DIR: path.join(environment.buildDir, 'apps/web') },
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  const gone = new Promise<void>((resolve) => api.once('exit', () => resolve()));
  const worker: TestWorker = await startTestWorker(variables);
  for (let turn = 0; turn < 200 && (await fetch(`${url}/api/health/ready`).catch(() => undefined))?.ok !== true; turn++) {
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: flags });
  const faults: string[] = [];
  const storageOrigin = new URL(environment.storage.endpoint).origin;
  const checks: Promise<void>[] = [];
  const watch = (page: Page) => {
    page.on('pageerror', (error) => faults.push(`uncaught on ${new URL(page.url()).pathname}: ${error.message}`));
    page.on('console', (message) => {
      // The browser itself notes every refused request; which refusals are right is for the tests to say.
      if (message.type() === 'error' && !message.text().startsWith('Failed to load resource')) faults.push(`console: ${message.text()}`);
    });
    page.on('request', (request) => {
      const { origin, protocol } = new URL(request.url());
      if (/^https?:$/.test(protocol) && origin !== url && origin !== storageOrigin) faults.push(`foreign host: ${origin}`);
    });
    page.on('response', (response) => {
      const { pathname, origin } = new URL(response.url());
      if (origin !== url || !pathname.startsWith('/api/v1/') || pathname === '/api/v1/events') return;
      checks.push(
        (async () => {
          // A page that has moved on takes its answers with it.
          const text = await response.text().catch(() => undefined);
          if (text === undefined) return;
          const body: unknown = text === '' ? undefined : JSON.parse(text);
          checkAgainstDocument({ method: response.request().method(), path: pathname, status: response.status(), contentType: response.headers()['content-type'] ?? null, body });
        })().catch((error: unknown) => void faults.push(String(error))),
      );
    });
  };
  return {
    url,
    database,
    browser,
    faults,
    workerLog: worker.log,
    openBrowser: async (options = {}) => {
      const context = await browser.newContext({ baseURL: url, viewport: { width: 1440, height: 900 }, ...options });
      context.on('page', watch);
      const page = await context.newPage();
      page.setDefaultTimeout(30_000);
      return { context, page };
    },
    visit: () => new ApiUser(url, url),
    close: async () => {
      // An answer that never ends, such as that of a page which was left, ends with the browser.
      await browser.close();
      await Promise.all(checks);
      await worker.stop();
      api.kill('SIGTERM');
      await gone;
      await database.drop();
    },
  };
}
