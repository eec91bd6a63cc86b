import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import { z } from 'zod';
import type { Page, PageQuery, Project } from '@masswright/contracts';
import { findProject, insertProject, isProjectNameTaken, listProjects, publishEvent, renameProject } from '@masswright/drizzle';
import { AppError, notFound } from '../platform/app-error';
import { decodeCursor, toPage } from '../platform/cursor';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work } from '../platform/work';
import { requireEdit } from './project.policy';
import { presentProject } from './project.presenter';

const nameTaken = () =>
  new AppError('conflict', 'There is a project of this name already.', { fields: [{ path: 'name', message: 'There is a project of this name already.' }] });

@Injectable()
export class ProjectsService {
  constructor(@Inject(Work) private readonly work: Work) {}

  list(context: SignedInContext, query: PageQuery): Promise<Page<Project>> {
    const after = decodeCursor(z.tuple([z.string(), z.uuid()]), query.after);
    return this.work.run(context, async (tx, actor) => {
      const rows = await listProjects(tx, { after: after === undefined ? undefined : { name: after[0], id: after[1] }, limit: query.limit + 1 });
      return toPage(rows, query.limit, (row) => presentProject(row, actor), (row) => [row.name, row.id]);
    });
  }

  get(context: SignedInContext, projectId: string): Promise<Project> {
    return this.work.run(context, async (tx, actor) => {
      const row = await findProject(tx, projectId);
      if (row === undefined) throw notFound('project');
      return presentProject(row, actor);
    });
  }

  create(context: SignedInContext, name: string): Promise<Project> {
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      if (await isProjectNameTaken(tx, name)) throw nameTaken();
      const id = randomUUID();
      await insertProject(tx, { id, organisationId: context.organisationId, name, createdBy: context.userId });
      await audit(tx, context, { action: 'project.create', subject: { type: 'project', id }, after: { name } });
      await publishEvent(tx, { organisationId: context.organisationId, event: { type: 'project', projectId: id } });
      const row = await findProject(tx, id);
      if (row === undefined) throw new Error('A project vanished while it was made.');
      return presentProject(row, actor);
    });
  }

  rename(context: SignedInContext, projectId: string, name: string): Promise<Project> {
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const row = await findProject(tx, projectId);
      if (row === undefined) throw notFound('project');
      if (await isProjectNameTaken(tx, name, projectId)) throw nameTaken();
      await renameProject(tx, projectId, name);
      await audit(tx, context, { action: 'project.rename', subject: { type: 'project', id: projectId }, before: { name: row.name }, after: { name } });
      await publishEvent(tx, { organisationId: context.organisationId, event: { type: 'project', projectId } });
      return presentProject({ ...row, name }, actor);
    });
  }
}
