import { randomInt } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ApiUser } from '../../support/api-user';
import { block, sphere } from '../../support/meshes';
import { createRandom } from './random';
import { lockMs, startStack, waitFor, type Stack } from './stack';
import { addInsisting, expectAllMeasured, type Acknowledged } from './uploads-under-fire';

const seed = Number(process.env['KILL_SEED'] ?? randomInt(2 ** 31));
console.log(`Rounds of kills with seed ${seed} (KILL_SEED=${seed} repeats them).`);

let stack: Stack;
let user: ApiUser;
let projectId: string;
let meshes = 0;

/** A mesh that no other test has, so that its measurement can be counted. */
const newMesh = (facets = 12) => {
  meshes += 1;
  return facets === 12 ? block([0, 0, 0], [10, 20, 1 + meshes / 128]) : sphere(10 + meshes / 128, facets);
};
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));
const runState = async (partId: string) =>
  (await stack.look<{ state: string; fence: number; finished_at: Date | null }>(`select r.state, r.fence, r.finished_at from measuring_runs r join revisions v on v.id = r.revision_id where v.part_id = $1`, [partId]))[0];
const isSomeoneWaitingForLock = async (on: string) =>
  (await stack.look(`select 1 from pg_stat_activity where wait_event_type = 'Lock' and application_name = 'masswright-worker' and query like $1`, [`%${on}%`])).length > 0;
const isApiWaitingForLock = async () => (await stack.look(`select 1 from pg_stat_activity where wait_event_type = 'Lock' and application_name = 'masswright-api'`)).length > 0;

beforeAll(async () => {
  stack = await startStack();
  user = stack.visit();
  await user.signUp();
  projectId = (await user.createProject()).id;
});
afterAll(async () => {
  await stack.stop();
});

describe('a kill between each pair of steps', () => {
  it('between commit and enqueue: the worker was held, then killed, before it could relay', async () => {
    stack.worker.kill('SIGSTOP');
    const added = await addInsisting(user, projectId, 'a.stl', newMesh());
    expect((await runState(added.partId))?.state).toBe('queued');
    stack.worker.kill('SIGKILL');
    await expectAllMeasured(stack, user, [added]);
  });

  /** Completes an upload whose object can't be read until the storage is let go: its job is in the queue and taken, and stands there. */
  async function completeUnreadable(bytes: Uint8Array): Promise<Acknowledged> {
    const upload = await user.send(projectId, 'unreadable.stl', bytes);
    // The api has done with the storage when it waits for this lock.
    const release = await stack.hold('lock table revisions in share row exclusive mode');
    const completing = user.complete(upload.id);
    await waitFor('the api waits to insert', isApiWaitingForLock);
    stack.objectStorage.kill('SIGSTOP');
    await release();
    const { id: partId } = await completing;
    await waitFor('the worker has the job', async () => (await runState(partId))?.state === 'running');
    return { partId, uploadId: upload.id, bytes };
  }

  it.each<[string, () => Promise<void>]>([
    ['the worker was killed', () => Promise.resolve(stack.worker.kill('SIGKILL'))],
    ['Redis was killed', () => Promise.resolve(stack.redis.kill('SIGKILL'))],
    ['Redis was flushed', () => stack.flushRedis()],
    ['Redis was flushed and killed, and the worker killed', async () => {
      await stack.flushRedis();
      stack.redis.kill('SIGKILL');
      stack.worker.kill('SIGKILL');
    }],
    ['PostgreSQL was killed', () => Promise.resolve(stack.postgres.kill('SIGKILL'))],
  ])('between enqueue and read: %s', async (_, strike) => {
    const added = await completeUnreadable(newMesh());
    await strike();
    await pause(200);
    stack.objectStorage.kill('SIGCONT');
    await expectAllMeasured(stack, user, [added]);
  });

  it('while it is read: the storage was killed', async () => {
    const added = await completeUnreadable(newMesh());
    stack.objectStorage.kill('SIGKILL');
    await expectAllMeasured(stack, user, [added]);
  });

  it('between read and insert: the worker was killed while its insert waited', async () => {
    const bytes = newMesh();
    const upload = await user.send(projectId, 'd.stl', bytes);
    const release = await stack.hold('lock table measurements in share row exclusive mode');
    const part = await user.complete(upload.id);
    await waitFor('the worker waits to insert', () => isSomeoneWaitingForLock('measurements'));
    stack.worker.kill('SIGKILL');
    await stack.worker.waitForExit();
    await release();
    await expectAllMeasured(stack, user, [{ partId: part.id, uploadId: upload.id, bytes }]);
  });

  it('between read and insert: PostgreSQL was killed while the insert waited', async () => {
    const bytes = newMesh();
    const upload = await user.send(projectId, 'e.stl', bytes);
    const release = await stack.hold('lock table measurements in share row exclusive mode');
    const part = await user.complete(upload.id);
    await waitFor('the worker waits to insert', () => isSomeoneWaitingForLock('measurements'));
    stack.postgres.kill('SIGKILL');
    await release();
    await expectAllMeasured(stack, user, [{ partId: part.id, uploadId: upload.id, bytes }]);
  });

  it('between insert and acknowledge: the worker was killed before it could note that the work is done', async () => {
    const bytes = newMesh();
    const upload = await user.send(projectId, 'f.stl', bytes);
    const before = await stack.hold('lock table measurements in share row exclusive mode');
    const part = await user.complete(upload.id);
    await waitFor('the worker waits to insert', () => isSomeoneWaitingForLock('measurements'));
    // The row of the outbox is held, so that the figures can be stored but not acknowledged.
    const release = await stack.hold('select 1 from outbox where done_at is null for update');
    await before();
    await waitFor('the figures are stored', async () => (await runState(part.id))?.state === 'done');
    await waitFor('the worker waits to acknowledge', () => isSomeoneWaitingForLock('outbox'));
    const stored = await runState(part.id);
    stack.worker.kill('SIGKILL');
    await stack.worker.waitForExit();
    await release();
    await expectAllMeasured(stack, user, [{ partId: part.id, uploadId: upload.id, bytes }]);
    expect(await runState(part.id)).toEqual(stored);
  });

  it('before the answer to a completion: the api was killed, and asking again gives the one part', async () => {
    const bytes = newMesh();
    const upload = await user.send(projectId, 'g.stl', bytes);
    const release = await stack.hold('lock table revisions in share row exclusive mode');
    const lost = user.complete(upload.id).then(() => 'answered', () => 'lost');
    await waitFor('the api waits to insert', isApiWaitingForLock);
    stack.api.kill('SIGKILL');
    await release();
    expect(await lost).toBe('lost');
    const added = await addAgain(upload.id);
    await expectAllMeasured(stack, user, [{ partId: added, uploadId: upload.id, bytes }]);
  });

  async function addAgain(uploadId: string): Promise<string> {
    let id = '';
    await waitFor('the api takes the completion', async () => {
      id = (await user.complete(uploadId).catch(() => undefined))?.id ?? '';
      return id !== '';
    });
    return id;
  }
});

describe('a worker held longer than its lock', () => {
  it('finds, when it wakes, that another has done its work, and changes nothing', async () => {
    const bytes = newMesh();
    const upload = await user.send(projectId, 'held.stl', bytes);
    const release = await stack.hold('lock table measurements in share row exclusive mode');
    const part = await user.complete(upload.id);
    await waitFor('the worker waits to insert', () => isSomeoneWaitingForLock('measurements'));
    const held = await runState(part.id);
    stack.worker.kill('SIGSTOP');
    const second = await stack.startSecondWorker();
    // What the held worker's connection still waits for in PostgreSQL would go through once the lock is gone: only the fence keeps it out.
    await waitFor('another worker takes the run up', async () => ((await runState(part.id))?.fence ?? 0) > (held?.fence ?? 0), 6 * lockMs + 10_000);
    await release();
    await waitFor('the figures are stored', async () => (await runState(part.id))?.state === 'done');
    const done = await runState(part.id);
    stack.worker.kill('SIGCONT');
    await pause(2 * lockMs);
    expect(await runState(part.id)).toEqual(done);
    await expectAllMeasured(stack, user, [{ partId: part.id, uploadId: upload.id, bytes }]);
    await second.stop();
  });
});

describe('a worker that was superseded', () => {
  it('does not call the work done: should its successor die, the run is still taken up again', async () => {
    const bytes = newMesh();
    const upload = await user.send(projectId, 'superseded.stl', bytes);
    const release = await stack.hold('lock table measurements in share row exclusive mode');
    const part = await user.complete(upload.id);
    await waitFor('the worker waits to insert', () => isSomeoneWaitingForLock('measurements'));
    // Another has taken it up, as far as the first can see, and is still at it.
    await stack.look(`update measuring_runs set fence = fence + 1 where revision_id = $1`, [part.revision.id]);
    await release();
    await waitFor('the first is refused', async () => (await stack.look(`select 1 from pg_stat_activity where wait_event_type = 'Lock' and application_name = 'masswright-worker'`)).length === 0);
    // Nobody is at it any more: only the open row of the outbox brings it back.
    await expectAllMeasured(stack, user, [{ partId: part.id, uploadId: upload.id, bytes }]);
    expect((await runState(part.id))?.fence).toBe(3);
  });
});

describe('twenty rounds of kills at random moments', () => {
  const victims = ['worker', 'redis', 'redis, flushed', 'postgres', 'api'] as const;
  const random = createRandom(seed);
  const rounds = Array.from({ length: 20 }, (_, index) => ({
    round: index + 1,
    victim: victims[index % victims.length] ?? 'worker',
    second: random() < 0.4 ? victims[Math.floor(random() * victims.length)] : undefined,
    delayMs: Math.floor(random() * 400),
    gapMs: Math.floor(random() * 300),
    facets: random() < 0.5 ? 12 : 40_000,
  }));

  async function kill(victim: (typeof victims)[number]): Promise<void> {
    if (victim === 'redis, flushed') await stack.flushRedis().catch(() => undefined);
    const service = { worker: stack.worker, redis: stack.redis, 'redis, flushed': stack.redis, postgres: stack.postgres, api: stack.api }[victim];
    service.kill('SIGKILL');
  }

  it.each(rounds)('round $round: $victim (then $second) after $delayMs ms', async ({ victim, second, delayMs, gapMs, facets }) => {
    const adding = [1, 2, 3].map((n) => addInsisting(user, projectId, `round-${n}.stl`, newMesh(facets)));
    await pause(delayMs);
    await kill(victim);
    if (second !== undefined) {
      await pause(gapMs);
      await kill(second);
    }
    await expectAllMeasured(stack, user, await Promise.all(adding));
  });
});
