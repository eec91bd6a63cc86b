import { Inject, Injectable } from '@nestjs/common';
import type { MeasuringError, MeasuringRun } from '@masswright/contracts';
import {
  claimMeasuring,
  Database,
  failRun,
  finishRun,
  handBackRun,
  keepMeasurement,
  noteProgress,
  publishEvent,
  recordAudit,
  refreshPartSummaries,
  setUploadHash,
  showFigures,
  takeRun,
  type TakenRun,
  type Transaction,
} from '@masswright/drizzle';
import { measuringVersion } from '@masswright/geometry';
import type { JobPayload } from '@masswright/jobs';
import { summarisePart } from '@masswright/mechanics';
import { HandedBackError, SupersededError, TryAgainError, PostponedError, type JobContext } from '../queue/job-handlers';
import { LatestOnly } from './latest-only';
import { isReadTwice, withoutExamination, type FirstFigures, type MeasuringOutcome, type MeasuringProgress } from './measure-object';
import type { ThreadNews } from './measure-thread';
import { MeasuringThreads, TookTooLongError } from './measuring-threads';

/** A run taken up so often without an orderly end ends each time with the death of the process: then it is the file that kills it. */
const mostUnendedTakeUps = 25;
const gaveUp: MeasuringError = {
  code: 'gave-up',
  message: 'Measuring this file was begun again and again and never came to an end. Export the mesh with fewer facets, or split it, and add it again.',
  at: null,
};
const tookTooLong: MeasuringError = {
  code: 'took-too-long',
  message: 'Measuring this file took longer than a file of its size may take, and was broken off. Measure it again when less is going on, or export the mesh with fewer facets.',
  at: null,
};
const fileMissing: MeasuringError = {
  code: 'file-missing',
  message: 'The stored file is gone from the storage. Add the file again; if it happens again, tell whoever runs this installation.',
  at: null,
};
/** Shares of a run's time, for the progress bar: what is left is finishing. A file that is examined apart is read twice. */
const readingShare = 0.8;
const firstReadingShare = 0.4;
const examiningShare = 0.9;
/** So long a run waits before it looks again whether the same bytes are measured by now. */
const waitForSameBytesMs = 400;

/** `figures`: what stands already of a file that is examined yet. */
type Held = TakenRun & { organisationId: string; figures?: FirstFigures };

/** Measures a revision's file: takes the run up, has a thread stream the object, and keeps what came of it. */
@Injectable()
export class MeasuringHandler {
  constructor(
    @Inject(Database) private readonly database: Database,
    @Inject(MeasuringThreads) private readonly threads: MeasuringThreads,
  ) {}

  async handle({ organisationId, runId }: JobPayload<'measurement.run'>, context: JobContext): Promise<void> {
    const run = await this.takeUp(organisationId, runId);
    if (run === undefined) return;
    try {
      if (run.unendedTakeUps > mostUnendedTakeUps) {
        await this.refuse(run, null, gaveUp, context);
        return;
      }
      if (run.hashFirst && (await this.isSettledByHash(run, context))) return;
      await this.settle(run, await this.measure(run, context), context);
    } catch (error) {
      // Whoever took the run up after us does the rest, and says so when it is done.
      if (error instanceof SupersededError) throw error;
      if (error instanceof TookTooLongError) {
        await (run.figures ? this.keep(run, { ...run.figures, measurement: withoutExamination(run.figures.measurement) }, context) : this.refuse(run, null, tookTooLong, context));
        return;
      }
      await this.inOrganisation(run, (tx) => handBackRun(tx, run)).catch(() => undefined);
      if (context.signal.aborted) throw new HandedBackError('The process stops.', { cause: error });
      throw error;
    }
  }

  private takeUp(organisationId: string, runId: string): Promise<Held | undefined> {
    return this.database.transaction({ organisationId }, async (tx) => {
      const taken = await takeRun(tx, runId);
      if (taken === undefined) return undefined;
      const run = { ...taken, organisationId };
      // One that only looks again whether its bytes are measured by now is not news; many may, several times a second.
      if (!run.hashFirst || run.sha256 === null) await this.announce(tx, run, { state: 'running', stage: run.hashFirst ? 'hashing' : 'reading', progress: 0 });
      return run;
    });
  }

  /** Finds out the file's hash and whether its bytes are known; true when that ends the run. */
  private async isSettledByHash(run: Held, context: JobContext): Promise<boolean> {
    let { sha256 } = run;
    if (sha256 === null) {
      const outcome = await this.inThread(run, context, (onNews) => this.threads.hash(run, onNews, context.signal));
      if (outcome.kind === 'interrupted') {
        await this.settle(run, outcome, context);
        return true;
      }
      sha256 = Buffer.from(outcome.sha256);
    }
    const claim = await this.claim(run, sha256, context);
    if (claim === 'wait') throw new PostponedError('The same bytes are being measured, or may be.', waitForSameBytesMs);
    return claim === 'known';
  }

  private claim(run: Held, sha256: Buffer, { requestId }: JobContext): Promise<'known' | 'claimed' | 'wait'> {
    return this.inOrganisation(run, async (tx) => {
      const claim = await claimMeasuring(tx, run, sha256, measuringVersion);
      if (claim.kind === 'lost') throw new SupersededError();
      if (claim.kind === 'known') await this.end(tx, run, claim.measurementId, requestId);
      return claim.kind;
    });
  }

  private measure(run: Held, context: JobContext): Promise<MeasuringOutcome> {
    return this.inThread(run, context, (onNews) => this.threads.measure(run, onNews, context.signal));
  }

  private async inThread<Outcome>(run: Held, context: JobContext, work: (onNews: (news: ThreadNews) => void) => Promise<Outcome>): Promise<Outcome> {
    const notes = new LatestOnly((progress: MeasuringProgress) => this.note(run, progress));
    let figures = Promise.resolve();
    try {
      return await work((news) => {
        // One after the other: what is noted later must not be overtaken by figures that are written yet.
        if (news.kind === 'progress') void figures.then(() => notes.push(news.progress));
        // Whoever took the run up meanwhile has figures of its own; any other failure is that of the end, which is yet to come.
        else figures = notes.settle().then(() => this.show(run, news.figures, context)).catch(() => undefined);
      });
    } finally {
      await figures;
      await notes.settle();
    }
  }

  /** Lets people see the figures while the rest is examined. */
  private async show(run: Held, figures: FirstFigures, { requestId }: JobContext): Promise<void> {
    run.figures = figures;
    // What is open has no figures yet, and may get some.
    if (!figures.measurement.soundness.defensible) return;
    const sha256 = Buffer.from(figures.sha256);
    await this.inOrganisation(run, async (tx) => {
      await setUploadHash(tx, run.uploadId, sha256);
      const measurementId = await keepMeasurement(tx, { organisationId: run.organisationId, sha256, measurement: figures.measurement });
      if (!(await showFigures(tx, run, measurementId))) throw new SupersededError();
      await refreshPartSummaries(tx, run.organisationId, [run.partId], summarisePart);
      await this.audit(tx, run, requestId, 'measurement.show', { measurementId });
      await this.announce(tx, run, { state: 'running', stage: 'examining', progress: firstReadingShare });
    });
  }

  private async note(run: Held, { stage: noted, bytesRead }: MeasuringProgress): Promise<void> {
    // A run that hashed first has claimed these bytes by its stage: that must not be taken back while they are read once more.
    const stage = run.hashFirst && noted === 'reading' ? 'measuring' : noted;
    const progress = this.computeProgress(run, noted, bytesRead);
    await this.inOrganisation(run, async (tx) => {
      if (await noteProgress(tx, run, { stage, progress })) await this.announce(tx, run, { state: 'running', stage, progress });
    });
  }

  private computeProgress(run: Held, stage: MeasuringProgress['stage'], bytesRead: number): number {
    const share = bytesRead / Math.max(1, run.sizeBytes);
    const hashingShare = run.hashFirst ? 0.3 : 0;
    const read = isReadTwice(run) ? firstReadingShare : readingShare;
    if (stage === 'hashing') return hashingShare * share;
    if (stage === 'examining') return read + (examiningShare - read) * share;
    return stage === 'reading' ? hashingShare + (read - hashingShare) * share : read;
  }

  private async settle(run: Held, outcome: MeasuringOutcome, context: JobContext): Promise<void> {
    switch (outcome.kind) {
      case 'measured':
        await this.keep(run, outcome, context);
        return;
      case 'refused':
        await this.refuse(run, outcome.sha256, outcome.error, context);
        return;
      case 'interrupted':
        if (outcome.code !== 'not-found') throw new TryAgainError(`The storage failed while the file was read (${outcome.code}).`);
        await this.refuse(run, null, fileMissing, context);
    }
  }

  private async keep(run: Held, { sha256, measurement }: FirstFigures, { requestId }: JobContext): Promise<void> {
    const hash = Buffer.from(sha256);
    await this.inOrganisation(run, async (tx) => {
      await setUploadHash(tx, run.uploadId, hash);
      await this.end(tx, run, await keepMeasurement(tx, { organisationId: run.organisationId, sha256: hash, measurement }), requestId);
    });
  }

  private async end(tx: Transaction, run: Held, measurementId: string, requestId: string): Promise<void> {
    if (!(await finishRun(tx, run, measurementId))) throw new SupersededError();
    await refreshPartSummaries(tx, run.organisationId, [run.partId], summarisePart);
    await this.audit(tx, run, requestId, 'measurement.keep', { measurementId });
    await this.announce(tx, run, { state: 'done', stage: 'storing', progress: 1 });
  }

  /** The row keeps the reason. The bytes stay as long as the part does: the file can be read again, and nobody's only copy is thrown away. */
  private async refuse(run: Held, sha256: Uint8Array | null, error: MeasuringError, { requestId }: JobContext): Promise<void> {
    await this.inOrganisation(run, async (tx) => {
      if (!(await failRun(tx, run, error))) throw new SupersededError();
      if (sha256 !== null) await setUploadHash(tx, run.uploadId, Buffer.from(sha256));
      await refreshPartSummaries(tx, run.organisationId, [run.partId], summarisePart);
      await this.audit(tx, run, requestId, 'measurement.refuse', { code: error.code });
      await this.announce(tx, run, { state: 'failed', stage: 'reading', progress: 1 });
    });
  }

  private inOrganisation<Result>(run: Held, work: (tx: Transaction) => Promise<Result>): Promise<Result> {
    return this.database.transaction({ organisationId: run.organisationId }, work);
  }

  /** The worker changed it, and nobody but the request that asked for it is behind that. */
  private audit(tx: Transaction, run: Held, requestId: string, action: string, after: object): Promise<void> {
    return recordAudit(tx, { organisationId: run.organisationId, actorId: null, action, subject: { type: 'revision', id: run.revisionId }, after, requestId });
  }

  private announce(tx: Transaction, run: Held, state: Pick<MeasuringRun, 'state' | 'stage' | 'progress'>): Promise<void> {
    const { organisationId, projectId, partId } = run;
    return publishEvent(tx, { organisationId, event: { type: 'run', projectId, partId, ...state } });
  }
}
