import { Inject, Injectable } from '@nestjs/common';
import { Database, findPartsWithoutSummary, refreshPartSummaries } from '@masswright/drizzle';
import { summarisePart } from '@masswright/mechanics';

const batch = 200;

/** Summarises parts that have no summary: those of an installation that is older than the summaries. */
@Injectable()
export class MissingSummaries {
  constructor(@Inject(Database) private readonly database: Database) {}

  async write(): Promise<void> {
    for (;;) {
      const missing = await this.database.transaction({ relay: true }, (tx) => findPartsWithoutSummary(tx, batch));
      for (const organisationId of new Set(missing.map((one) => one.organisationId))) {
        const partIds = missing.filter((one) => one.organisationId === organisationId).map(({ partId }) => partId);
        await this.database.transaction({ organisationId }, (tx) => refreshPartSummaries(tx, organisationId, partIds, summarisePart));
      }
      if (missing.length < batch) return;
    }
  }
}
