import { Body, Controller, Inject, Param, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { deletePartsRequest, id, movedParts, restorePartsRequest, type DeletePartsRequest, type MovedParts, type RestorePartsRequest } from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { PartDeletionsService } from './part-deletions.service';

@ApiTags('parts')
@Controller('projects/:projectId')
export class PartDeletionsController {
  constructor(@Inject(PartDeletionsService) private readonly service: PartDeletionsService) {}

  @Post('part-deletions')
  @Operation({ summary: 'Delete parts, with a way back for thirty days', status: 201, answer: movedParts })
  delete(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string, @Body({ schema: deletePartsRequest }) request: DeletePartsRequest): Promise<MovedParts> {
    return this.service.delete(context, projectId, request.parts);
  }

  @Post('part-restorations')
  @Operation({ summary: 'Restore deleted parts', status: 201, answer: movedParts })
  restore(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string, @Body({ schema: restorePartsRequest }) request: RestorePartsRequest): Promise<MovedParts> {
    return this.service.restore(context, projectId, request.parts);
  }
}
