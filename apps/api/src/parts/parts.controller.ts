import { Body, Controller, Get, Inject, Param, Patch, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { z } from 'zod';
import {
  changeSettingRequest,
  failedRecord,
  id,
  part,
  renamePartRequest,
  statementRecord,
  type ChangeSettingRequest,
  type FailedRecord,
  type Part,
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

  @Post('parts/:partId/run')
  @Operation({ summary: 'Read a file once more that could not be measured, or that an earlier measuring version measured', answer: part })
  measureAgain(@SignedIn() context: SignedInContext, @Param('partId', { schema: id }) partId: string): Promise<Part> {
    return this.service.measureAgain(context, partId);
  }

  @Get('parts/:partId/statement')
  @Operation({ summary: 'The record of the part’s statement, or why its file could not be measured', answer: z.union([statementRecord, failedRecord]) })
  getStatement(@SignedIn() context: SignedInContext, @Param('partId', { schema: id }) partId: string): Promise<StatementRecord | FailedRecord> {
    return this.service.getStatement(context, partId);
  }
}
