import { Controller, Get, Inject, Param, Query, Res } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { Response } from 'express';
import { z } from 'zod';
import { exportedRecord, exportQuery, id, type ExportQuery } from '@masswright/contracts';
import { describeAttachment, makeFileName, sendPieces } from '../platform/attachment';
import { Operation } from '../platform/operation';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { PartExportsService } from './part-exports.service';

const mediaTypes = { csv: 'text/csv', json: 'application/json' } as const;

@ApiTags('parts')
@Controller()
export class PartExportsController {
  constructor(@Inject(PartExportsService) private readonly service: PartExportsService) {}

  @Get('projects/:projectId/parts/export')
  @Operation({
    summary: 'What the list of parts shows, as a table or as the records of its statements, each with its part’s number, name and revision',
    file: { 'text/csv': z.string(), 'application/json': z.array(exportedRecord) },
  })
  async export(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string, @Query({ schema: exportQuery }) query: ExportQuery, @Res() response: Response): Promise<void> {
    const { projectName, pieces } = await this.service.begin(context, projectId, query);
    const described = { fileName: makeFileName(`Parts of ${projectName}`, query.format), mediaType: mediaTypes[query.format] };
    await sendPieces(response, pieces, () => describeAttachment(response, described));
  }
}
