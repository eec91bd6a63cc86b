import { Inject, Injectable } from '@nestjs/common';
import { z } from 'zod';
import type { ChangeSettingRequest, FailedRecord, Page, PageQuery, Part, PartRow, Setting, StatementRecord } from '@masswright/contracts';
import { changeSetting, findPart, findProject, listParts, publishEvent, renamePart, type StoredPart, type Transaction } from '@masswright/drizzle';
import { AppError, notFound } from '../platform/app-error';
import { decodeCursor, toPage } from '../platform/cursor';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work } from '../platform/work';
import { requireEdit } from '../projects/project.policy';
import { presentPart, presentPartRow, presentStatement, readSetting } from './part.presenter';

async function getStoredPart(tx: Transaction, partId: string): Promise<StoredPart> {
  const stored = await findPart(tx, partId);
  if (stored === undefined) throw notFound('part');
  return stored;
}

@Injectable()
export class PartsService {
  constructor(@Inject(Work) private readonly work: Work) {}

  list(context: SignedInContext, projectId: string, query: PageQuery): Promise<Page<PartRow>> {
    const after = decodeCursor(z.tuple([z.number().int()]), query.after);
    return this.work.run(context, async (tx) => {
      if ((await findProject(tx, projectId)) === undefined) throw notFound('project');
      const rows = await listParts(tx, projectId, { afterNumber: after?.[0] ?? 0, limit: query.limit + 1 });
      return toPage(rows, query.limit, presentPartRow, (row) => [row.part.number]);
    });
  }

  get(context: SignedInContext, partId: string): Promise<Part> {
    return this.work.run(context, async (tx, actor) => presentPart(await getStoredPart(tx, partId), actor));
  }

  getStatement(context: SignedInContext, partId: string): Promise<StatementRecord | FailedRecord> {
    return this.work.run(context, async (tx) => {
      const record = presentStatement(await getStoredPart(tx, partId));
      if (record === undefined) throw new AppError('conflict', 'There is no statement yet: the file is not measured, or its unit is not stated.');
      return record;
    });
  }

  rename(context: SignedInContext, partId: string, name: string): Promise<Part> {
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const stored = await getStoredPart(tx, partId);
      await renamePart(tx, partId, name);
      await audit(tx, context, { action: 'part.rename', subject: { type: 'part', id: partId }, before: { name: stored.part.name }, after: { name } });
      await this.announce(tx, context, stored);
      return presentPart({ ...stored, part: { ...stored.part, name } }, actor);
    });
  }

  changeSetting(context: SignedInContext, partId: string, request: ChangeSettingRequest): Promise<Part> {
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const stored = await getStoredPart(tx, partId);
      const before = readSetting(stored.setting);
      const { version, ...changes } = request;
      const setting: Setting = { ...before, ...changes };
      const isChanged = await changeSetting(tx, { revisionId: stored.revision.id, version, setting, changedBy: context.userId });
      if (!isChanged) {
        throw new AppError('stale-version', `${stored.settingChangedByName} changed this setting meanwhile. Look at theirs, then make your change again.`);
      }
      await audit(tx, context, { action: 'setting.change', subject: { type: 'revision', id: stored.revision.id }, before, after: setting });
      await this.announce(tx, context, stored);
      return presentPart(await getStoredPart(tx, partId), actor);
    });
  }

  private announce(tx: Transaction, context: SignedInContext, stored: StoredPart): Promise<void> {
    const { projectId, id: partId } = stored.part;
    return publishEvent(tx, { organisationId: context.organisationId, event: { type: 'part', projectId, partId } });
  }
}
