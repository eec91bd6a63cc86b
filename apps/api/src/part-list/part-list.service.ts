import { Inject, Injectable } from '@nestjs/common';
import type { PartList, PartListQuery } from '@masswright/contracts';
import { countSameBytes, findParts, hasProject, listPartIds } from '@masswright/drizzle';
import { presentPartRow } from '../parts/part.presenter';
import { notFound } from '../platform/app-error';
import type { SignedInContext } from '../platform/request-context';
import { Work } from '../platform/work';

@Injectable()
export class PartListService {
  constructor(@Inject(Work) private readonly work: Work) {}

  /** Which parts there are and in which order is read from their summaries; what is shown of them, from the parts themselves. */
  list(context: SignedInContext, projectId: string, query: PartListQuery): Promise<PartList> {
    return this.work.run(context, async (tx) => {
      if (!(await hasProject(tx, projectId))) throw notFound('project');
      const { partIds, counts, total, deleted } = await listPartIds(tx, projectId, query);
      const stored = await findParts(tx, partIds);
      const sameBytes = await countSameBytes(tx, stored.flatMap(({ upload }) => upload.sha256 ?? []));
      return { items: stored.map((part) => presentPartRow(part, sameBytes)), total, counts, deleted };
    });
  }
}
