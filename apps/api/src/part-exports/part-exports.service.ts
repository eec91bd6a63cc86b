import { Inject, Injectable } from '@nestjs/common';
import type { ExportedRecord, ExportQuery, FailedRecord, StatementRecord } from '@masswright/contracts';
import { findParts, findProject, listPartIds, readSummarySource, type StoredPart } from '@masswright/drizzle';
import { summarisePart } from '@masswright/mechanics';
import { presentStatement, revisionLetter } from '../parts/part.presenter';
import { notFound } from '../platform/app-error';
import { byteOrderMark, writeCsv } from '../platform/csv';
import type { SignedInContext } from '../platform/request-context';
import { Work } from '../platform/work';
import { makeExportTable, type ExportedPart } from './export-columns';

/** So many parts are read, written and forgotten at a time. */
const batch = 200;
/** More than any project has; the list of ids is all that is kept of the whole. */
const mostParts = 1_000_000;

export interface PartExport {
  projectName: string;
  pieces: AsyncGenerator<string>;
}

function readPart(stored: StoredPart): ExportedPart {
  const statement = presentStatement(stored);
  return { stored, record: statement === undefined || 'error' in statement ? undefined : statement, state: summarisePart(readSummarySource(stored)).state };
}

/** A record, or in its place why there is none. */
function readRecord(stored: StoredPart): StatementRecord | FailedRecord {
  const because = (code: FailedRecord['error']['code'], message: string): FailedRecord => ({ file: stored.upload.fileName, error: { code, message, at: null } });
  return (
    presentStatement(stored) ??
    (stored.measurement === null ? because('not-measured-yet', 'This file is not measured yet.') : because('unit-not-stated', 'The unit of this file is not stated, so no figure can be.'))
  );
}

/** The record with the part that it is of: names of files alone don't tell two records apart. */
function readExportedRecord(stored: StoredPart): ExportedRecord {
  const { number, name } = stored.part;
  return { part: { number, name, revision: revisionLetter(stored.revision.ordinal) }, ...readRecord(stored) };
}

/** A project's list as a file: what is shown, in its order. */
@Injectable()
export class PartExportsService {
  constructor(@Inject(Work) private readonly work: Work) {}

  /**
   * Which parts there are, and in which order, is read once; the parts themselves a few at a time, each few in a transaction of its own, since a slow
   * reader may take longer than a transaction may stay open. A part that is forgotten meanwhile is left out.
   */
  async begin(context: SignedInContext, projectId: string, query: ExportQuery): Promise<PartExport> {
    return this.work.run(context, async (tx) => {
      const project = await findProject(tx, projectId);
      if (project === undefined) throw notFound('project');
      const { partIds } = await listPartIds(tx, projectId, { ...query, offset: 0, limit: mostParts });
      const batches = this.readBatches(context, partIds);
      return { projectName: project.name, pieces: query.format === 'csv' ? writeTable(batches, query.columns) : writeRecords(batches) };
    });
  }

  private async *readBatches(context: SignedInContext, partIds: readonly string[]): AsyncGenerator<StoredPart[]> {
    for (let at = 0; at < partIds.length; at += batch) {
      yield await this.work.run(context, (tx) => findParts(tx, partIds.slice(at, at + batch)));
    }
  }
}

async function* writeTable(batches: AsyncIterable<StoredPart[]>, columns: string): AsyncGenerator<string> {
  const { header, readRow } = makeExportTable(columns);
  yield byteOrderMark + writeCsv([header]);
  for await (const parts of batches) yield writeCsv(parts.map((stored) => readRow(readPart(stored))));
}

async function* writeRecords(batches: AsyncIterable<StoredPart[]>): AsyncGenerator<string> {
  yield '[';
  let between = '\n';
  for await (const parts of batches) {
    if (parts.length === 0) continue;
    yield between + parts.map((stored) => JSON.stringify(readExportedRecord(stored))).join(',\n');
    between = ',\n';
  }
  yield '\n]\n';
}
