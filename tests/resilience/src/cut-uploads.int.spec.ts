import { createHash, randomBytes, randomInt } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { choosePartsToKeep, type OpenUploads, type Part, type PartGrants, type Problem, type Upload } from '@masswright/contracts';
import { createObjectStorage, type ObjectStorage } from '@masswright/storage';
import { startTestApi, type TestApi } from '../../support/api';
import { cutIntoParts, hashOf, type ApiUser } from '../../support/api-user';
import { environment } from '../../support/environment';
import { createTestDatabase, type TestDatabase } from '../../support/test-database';
import { sendCut, type Cut } from './cut-connection';
import { createRandom } from './random';

const seed = Number(process.env['CUT_SEED'] ?? randomInt(2 ** 31));
console.log(`Rounds of cut uploads with seed ${seed} (CUT_SEED=${seed} repeats them).`);
const random = createRandom(seed);
const below = (limit: number) => Math.floor(random() * limit);

const partBytes = 8 * 1024 * 1024;
const noise = randomBytes(2 * partBytes + 300_000);

/** A file with its parts and their hashes, as a browser knows it from the disk. */
interface Disk {
  bytes: Uint8Array;
  parts: Uint8Array<ArrayBuffer>[];
  hashes: string[];
}
/** What one try did: the parts that it passed over, those that it sent whole, and that which it was cut in. */
interface Try {
  listed: Upload['storedParts'];
  kept: number[];
  sent: number[];
  cut?: number;
}

let database: TestDatabase;
let api: TestApi;
let storage: ObjectStorage;
let engineer: ApiUser;
let projectId: string;
const totals = { kept: 0, sentAgain: 0, foreignReplaced: 0, wholeThoughCut: 0 };

beforeAll(async () => {
  database = await createTestDatabase();
  api = await startTestApi(database);
  storage = createObjectStorage(environment.storage);
  engineer = api.visit();
  await engineer.signUp();
  projectId = (await engineer.createProject()).id;
});
afterAll(async () => {
  storage.close();
  await api.close();
  await database.drop();
});

function readFromDisk(bytes: Uint8Array): Disk {
  const parts = cutIntoParts(bytes, { partSizeBytes: partBytes, partCount: Math.ceil(bytes.length / partBytes) });
  return { bytes, parts, hashes: parts.map(hashOf) };
}

/** Bytes that no other round has, in each of their parts. */
function makeFile(sizeBytes: number): Uint8Array {
  const bytes = new Uint8Array(noise.subarray(0, sizeBytes));
  for (let at = 0; at < sizeBytes; at += partBytes) bytes.set(randomBytes(16), at);
  return bytes;
}

/** Another file of the same size: some of its parts are the same, at least one is not, and the difference is one byte. */
function makeOther({ bytes, parts }: Disk): Uint8Array {
  const other = bytes.slice();
  const certain = below(parts.length);
  for (const [index, part] of parts.entries()) {
    const at = index * partBytes + 16 + below(part.length - 16);
    if (index === certain || random() < 0.4) other[at] = (other[at] ?? 0) ^ 1;
  }
  return other;
}

function chooseCut(length: number): Cut {
  const chance = random();
  if (chance < 0.15) return 'at the answer';
  // The edges are where a mistake of one byte would show.
  const after = chance < 0.25 ? length : chance < 0.35 ? length - 1 : chance < 0.4 ? 0 : below(length + 1);
  return { after, how: random() < 0.5 ? 'closed' : 'reset' };
}

/** The upload that a later try goes on with, found as the browser finds it: by name, folder and size. */
async function findBegun(fileName: string, { bytes }: Disk): Promise<Pick<Upload, 'id'>> {
  const { items } = await engineer.get<OpenUploads>(`/projects/${projectId}/uploads`);
  const found = items.find((one) => one.fileName === fileName && one.folder === '' && one.sizeBytes === bytes.length);
  return found ?? engineer.expect<Upload>('POST', `/projects/${projectId}/uploads`, { fileName, sizeBytes: bytes.length });
}

async function grantPart(uploadId: string, partNumber: number, sha256: string) {
  const { grants } = await engineer.expect<PartGrants>('POST', `/uploads/${uploadId}/part-grants`, { parts: [{ partNumber, sha256 }] });
  const [grant] = grants;
  if (!grant) throw new Error(`Part ${partNumber} was not granted.`);
  return grant;
}

/** Sends what the browser's own decision leaves to be sent, up to the part in which the connection is cut. */
async function trySending(uploadId: string, { parts, hashes }: Disk, cutIn?: { partNumber: number; cut: Cut }): Promise<Try> {
  const { storedParts } = await engineer.get<Upload>(`/uploads/${uploadId}`);
  const kept = (await choosePartsToKeep(storedParts, (partNumber) => Promise.resolve(hashes[partNumber - 1] ?? ''))).map(({ partNumber }) => partNumber);
  const done: Try = { listed: storedParts, kept, sent: [] };
  const missing = hashes.map((_, index) => index + 1).filter((partNumber) => !kept.includes(partNumber));
  // Parts go side by side in a browser: any of them may be the first to arrive.
  if (random() < 0.5) missing.reverse();
  for (const partNumber of missing) {
    const body = parts[partNumber - 1] ?? new Uint8Array();
    const grant = await grantPart(uploadId, partNumber, hashes[partNumber - 1] ?? '');
    if (cutIn?.partNumber === partNumber) {
      await sendCut(grant, body, cutIn.cut);
      return { ...done, cut: partNumber };
    }
    const answer = await fetch(grant.url, { method: 'PUT', headers: grant.headers, body });
    expect(answer.status).toBe(200);
    done.sent.push(partNumber);
  }
  return done;
}

/** What the storage may have of each part: what it acknowledged last, or what was wholly sent to it and not acknowledged. */
class Ledger {
  private readonly acknowledged = new Map<number, string>();
  private readonly possible = new Map<number, Set<string>>();

  note({ sent, cut }: Try, { hashes, parts }: Disk, cutAs: Cut | undefined): void {
    for (const partNumber of sent) {
      this.acknowledged.set(partNumber, hashes[partNumber - 1] ?? '');
      this.possible.delete(partNumber);
    }
    if (cut === undefined || cutAs === undefined) return;
    const wasWhole = cutAs === 'at the answer' || cutAs.after === parts[cut - 1]?.length;
    if (wasWhole) this.possible.set(cut, (this.possible.get(cut) ?? new Set()).add(hashes[cut - 1] ?? ''));
  }

  /** Holds a listing, and what was kept by it, against what was sent. */
  check({ listed, kept }: Try, { hashes }: Disk): void {
    for (const [index, own] of hashes.entries()) {
      const partNumber = index + 1;
      const stored = listed.find((part) => part.partNumber === partNumber)?.sha256;
      const certain = this.acknowledged.get(partNumber);
      const possible = this.possible.get(partNumber);
      // What was cut before its last byte is never there: what was there before still is.
      if (stored !== certain) expect(possible, `part ${partNumber}`).toContain(stored);
      if (stored !== certain) totals.wholeThoughCut += 1;
      // Whole and the same: not sent again. Cut, or another file's: sent.
      expect(kept.includes(partNumber), `part ${partNumber} is kept`).toBe(stored === own);
      if (certain === own && possible === undefined) expect(kept).toContain(partNumber);
      if (certain !== undefined && certain !== own && possible === undefined) totals.foreignReplaced += 1;
    }
  }
}

/** Asks for the part; where the storage has something else by now, what is missing is sent once more, as the browser does. */
async function complete(fileName: string, disk: Disk): Promise<Part> {
  for (let turn = 0; turn < 4; turn++) {
    const upload = await findBegun(fileName, disk);
    if (turn > 0) await trySending(upload.id, disk);
    const { status, body } = await engineer.ask<Part | Problem>('POST', `/uploads/${upload.id}/completion`, { setting: { lengthUnit: null, densityKgM3: null }, partHashes: disk.hashes });
    if (status === 201 && 'revision' in body) return body;
    expect([409, 422]).toContain(status);
  }
  throw new Error('The upload could not be completed.');
}

async function hashStored(key: string): Promise<string> {
  const hash = createHash('sha256');
  const { stream } = await storage.getObjectStream(key);
  for await (const chunk of stream) hash.update(chunk as Uint8Array);
  return hash.digest('hex');
}

const rounds = Array.from({ length: 100 }, (_, index) => ({
  round: index + 1,
  sizeBytes: partBytes * (random() < 0.15 ? 2 : 1) + 1 + below(250_000),
  cuts: 1 + below(3),
  other: random() < 0.35,
}));

describe('a hundred uploads, cut at random bytes', () => {
  it.each(rounds)('round $round: $sizeBytes bytes, cut $cuts times, another file in between: $other', async ({ round, sizeBytes, cuts, other }) => {
    const fileName = `round ${round}.stl`;
    const own = readFromDisk(makeFile(sizeBytes));
    const ledger = new Ledger();
    const step = async (disk: Disk, isCut: boolean) => {
      const partNumber = 1 + below(disk.parts.length);
      const cut = isCut ? chooseCut(disk.parts[partNumber - 1]?.length ?? 0) : undefined;
      const done = await trySending((await findBegun(fileName, disk)).id, disk, cut && { partNumber, cut });
      ledger.check(done, disk);
      ledger.note(done, disk, cut);
      return done;
    };
    for (let turn = 0; turn < cuts; turn++) await step(own, true);
    if (other) await step(readFromDisk(makeOther(own)), random() < 0.7);
    const last = await step(own, false);
    totals.kept += last.kept.length;
    totals.sentAgain += last.sent.length;
    const part = await complete(fileName, own);
    const [row] = await database.look<{ key: string }>('select object_key as key from uploads join revisions on upload_id = uploads.id where part_id = $1', [part.id]);
    expect(await hashStored(row?.key ?? '')).toBe(hashOf(own.bytes));
    await storage.deleteObject(row?.key ?? '');
  });

  it('had, all in all, parts that were kept, parts that were sent again, parts of other files, and parts that had arrived though their answer was lost', () => {
    console.log(`Of the last tries: ${totals.kept} parts kept, ${totals.sentAgain} sent again; ${totals.foreignReplaced} times another file's part lay there; ${totals.wholeThoughCut} times a part was whole though cut.`);
    for (const [what, count] of Object.entries(totals)) expect(count, what).toBeGreaterThan(0);
  });
});
