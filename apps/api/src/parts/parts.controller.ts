import { Body, Controller, Get, Inject, Param, Patch, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import {
  changeSettingRequest,
  failedRecord,
  id,
  page,
  pageQuery,
  part,
  partRow,
  renamePartRequest,
  statementRecord,
  type ChangeSettingRequest,
  type FailedRecord,
  type Page,
  type PageQuery,
  type Part,
  type PartRow,
  type RenamePartRequest,
  type StatementRecord,
} from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { PartsService } from './parts.service';

@ApiTags('parts')
@Controller()
export class PartsController {
  constructor(@Inject(PartsService) private readonly service: PartsService) {}

  @Get('projects/:projectId/parts')
  @Operation({ summary: 'The parts of a project, by number', answer: page(partRow) })
  list(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string, @Query({ schema: pageQuery }) query: PageQuery): Promise<Page<PartRow>> {
    return this.service.list(context, projectId, query);
  }

  @Get('parts/:partId')
  @Operation({ summary: 'A part: its latest revision, what was measured and how it is set', answer: part })
  get(@SignedIn() context: SignedInContext, @Param('partId', { schema: id }) partId: string): Promise<Part> {
    return this.service.get(context, partId);
  }

  @Patch('parts/:partId')
  @Operation({ summary: 'Rename a part', answer: part })
  rename(@SignedIn() context: SignedInContext, @Param('partId', { schema: id }) partId: string, @Body({ schema: renamePartRequest }) request: RenamePartRequest): Promise<Part> {
    return this.service.rename(context, partId, request.name);
  }

  @Patch('parts/:partId/setting')
  @Operation({ summary: 'Change the unit, density, axis or drive of a part', answer: part })
  changeSetting(@SignedIn() context: SignedInContext, @Param('partId', { schema: id }) partId: string, @Body({ schema: changeSettingRequest }) request: ChangeSettingRequest): Promise<Part> {
    return this.service.changeSetting(context, partId, request);
  }

  @Get('parts/:partId/statement')
  @Operation({ summary: 'The record of the part’s statement, or why its file could not be measured', answer: z.union([statementRecord, failedRecord]) })
  getStatement(@SignedIn() context: SignedInContext, @Param('partId', { schema: id }) partId: string): Promise<StatementRecord | FailedRecord> {
    return this.service.getStatement(context, partId);
  }
}
