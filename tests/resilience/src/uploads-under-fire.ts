import { createHash } from 'node:crypto';
import { expect } from 'vitest';
import type { Part } from '@masswright/contracts';
import { measureMesh } from '@masswright/geometry';
import type { ApiUser } from '../../support/api-user';
import { insist, waitFor, type Stack } from './stack';

export interface Acknowledged {
  partId: string;
  uploadId: string;
  bytes: Uint8Array;
}

/** Adds a mesh and insists until the server has acknowledged it. */
export async function addInsisting(user: ApiUser, projectId: string, fileName: string, bytes: Uint8Array): Promise<Acknowledged> {
  const upload = await insist(() => user.send(projectId, fileName, bytes));
  const part = await insist(() => user.complete(upload.id));
  return { partId: part.id, uploadId: upload.id, bytes };
}

/** Every acknowledged upload ends with exactly one right measurement, and nothing is left to do. */
export async function expectAllMeasured(stack: Stack, user: ApiUser, uploads: readonly Acknowledged[], timeoutMs = 60_000): Promise<void> {
  for (const { partId, uploadId, bytes } of uploads) {
    let part: Part | undefined;
    await waitFor(
      `part ${partId} is measured; it is ${part?.revision.run.state}`,
      async () => {
        part = await insist(() => user.get<Part>(`/parts/${partId}`));
        return part.revision.run.state === 'done' || part.revision.run.state === 'failed';
      },
      timeoutMs,
    );
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    expect(part?.revision.run.error).toBeNull();
    expect(part?.revision.sha256).toBe(sha256);
    // The same bytes and the same measuring version give the same bits.
    expect(part?.revision.measurement).toEqual(measureMesh(bytes));
    const [counts] = await stack.look<{ measurements: number; revisions: number; runs: number }>(
      `select (select count(*)::int from measurements where sha256 = decode($1, 'hex')) as measurements,
              (select count(*)::int from revisions where upload_id = $2) as revisions,
              (select count(*)::int from measuring_runs r join revisions v on v.id = r.revision_id where v.upload_id = $2) as runs`,
      [sha256, uploadId],
    );
    expect(counts).toEqual({ measurements: 1, revisions: 1, runs: 1 });
  }
  await waitFor('the outbox has no open row', async () => (await stack.look(`select 1 from outbox where done_at is null`)).length === 0, timeoutMs);
}
