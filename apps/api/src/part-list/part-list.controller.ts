import { Controller, Get, Inject, Param, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { id, partList, partListQuery, type PartList, type PartListQuery } from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { PartListService } from './part-list.service';

@ApiTags('parts')
@Controller()
export class PartListController {
  constructor(@Inject(PartListService) private readonly service: PartListService) {}

  @Get('projects/:projectId/parts')
  @Operation({ summary: 'A stretch of a project’s list of parts, and how many there are in each state', answer: partList })
  list(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string, @Query({ schema: partListQuery }) query: PartListQuery): Promise<PartList> {
    return this.service.list(context, projectId, query);
  }
}
