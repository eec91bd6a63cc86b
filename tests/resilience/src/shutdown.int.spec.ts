import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ApiUser } from '../../support/api-user';
import { listen } from '../../support/events';
import { block, sphere } from '../../support/meshes';
import { startStack, waitFor, type Stack } from './stack';
import { addInsisting, expectAllMeasured } from './uploads-under-fire';

let stack: Stack;
let user: ApiUser;
let projectId: string;

beforeAll(async () => {
  stack = await startStack();
  user = stack.visit();
  await user.signUp();
  projectId = (await user.createProject()).id;
});
afterAll(async () => {
  await stack.stop();
});

interface LogLine {
  msg?: string;
  err?: unknown;
}
const linesOf = (log: string) => log.split('\n').flatMap((line) => (line.startsWith('{') ? [JSON.parse(line) as LogLine] : []));

describe('SIGTERM', () => {
  it('lets the worker finish what it can and leave in time', async () => {
    const added = await addInsisting(user, projectId, 'a.stl', sphere(10, 60_000));
    stack.worker.kill('SIGTERM');
    await stack.worker.waitForExit();
    expect(linesOf(stack.worker.readLogTail(20)).at(-1)?.msg).toBe('stopped');
    await expectAllMeasured(stack, user, [added]);
  });

  it('makes the worker hand back a job that can’t be finished in time, for another to take up', async () => {
    const bytes = block([0, 0, 0], [1, 2, 3.25]);
    const upload = await user.send(projectId, 'b.stl', bytes);
    const release = await stack.hold('lock table revisions in share row exclusive mode');
    const completing = user.complete(upload.id);
    await waitFor('the api waits to insert', async () => (await stack.look(`select 1 from pg_stat_activity where wait_event_type = 'Lock' and application_name = 'masswright-api'`)).length > 0);
    stack.objectStorage.kill('SIGSTOP');
    await release();
    const part = await completing;
    const stateOf = async () => (await stack.look<{ state: string }>(`select r.state from measuring_runs r join revisions v on v.id = r.revision_id where v.part_id = $1`, [part.id]))[0]?.state;
    await waitFor('the worker has the job', async () => (await stateOf()) === 'running');
    const begun = Date.now();
    stack.worker.kill('SIGTERM');
    await stack.worker.waitForExit();
    // The deadline of this stack is 6 s.
    expect(Date.now() - begun).toBeLessThan(7_000);
    expect(linesOf(stack.worker.readLogTail(20)).map(({ msg }) => msg)).toContain('handed back');
    stack.objectStorage.kill('SIGCONT');
    await expectAllMeasured(stack, user, [{ partId: part.id, uploadId: upload.id, bytes }]);
  });

  it('makes the api end its streams, answer what it has begun, and leave', async () => {
    const stream = await listen(user);
    await stream.wait((event) => event.type === 'hello');
    const answers = Array.from({ length: 20 }, () => user.ask('GET', '/projects').then(({ status }) => status, () => 0));
    await new Promise((resolve) => setTimeout(resolve, 15));
    stack.api.kill('SIGTERM');
    await stream.ended;
    await stack.api.waitForExit();
    expect(linesOf(stack.api.readLogTail(30)).at(-1)?.msg).toBe('stopped');
    // What was accepted was answered; what came too late was refused as a connection, never half.
    expect((await Promise.all(answers)).every((status) => status === 200 || status === 0)).toBe(true);
    await waitFor('the api is there again', async () => (await user.ask('GET', '/session').catch(() => undefined))?.status === 200);
  });
});
