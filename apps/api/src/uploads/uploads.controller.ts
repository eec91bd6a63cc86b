import { Body, Controller, Delete, Get, Inject, Param, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  completeUploadRequest,
  createUploadRequest,
  grantPartsRequest,
  id,
  part,
  partGrants,
  upload,
  type CompleteUploadRequest,
  type CreateUploadRequest,
  type GrantPartsRequest,
  type Part,
  type PartGrants,
  type Upload,
} from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { UploadsService } from './uploads.service';

@ApiTags('uploads')
@Controller()
export class UploadsController {
  constructor(@Inject(UploadsService) private readonly service: UploadsService) {}

  @Post('projects/:projectId/uploads')
  @Operation({ summary: 'Announce a mesh file to be sent', status: 201, answer: upload })
  create(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string, @Body({ schema: createUploadRequest }) request: CreateUploadRequest): Promise<Upload> {
    return this.service.create(context, projectId, request);
  }

  @Get('uploads/:uploadId')
  @Operation({ summary: 'How far an upload is', answer: upload })
  get(@SignedIn() context: SignedInContext, @Param('uploadId', { schema: id }) uploadId: string): Promise<Upload> {
    return this.service.get(context, uploadId);
  }

  @Post('uploads/:uploadId/part-grants')
  @Operation({ summary: 'Addresses of the storage to which parts can be PUT', answer: partGrants })
  grantParts(@SignedIn() context: SignedInContext, @Param('uploadId', { schema: id }) uploadId: string, @Body({ schema: grantPartsRequest }) request: GrantPartsRequest): Promise<PartGrants> {
    return this.service.grantParts(context, uploadId, request.partNumbers);
  }

  @Post('uploads/:uploadId/completion')
  @Operation({ summary: 'Make a part of a wholly sent file and have it measured', status: 201, answer: part })
  complete(@SignedIn() context: SignedInContext, @Param('uploadId', { schema: id }) uploadId: string, @Body({ schema: completeUploadRequest }) request: CompleteUploadRequest): Promise<Part> {
    return this.service.complete(context, uploadId, request);
  }

  @Delete('uploads/:uploadId')
  @Operation({ summary: 'Cancel an upload', status: 204 })
  cancel(@SignedIn() context: SignedInContext, @Param('uploadId', { schema: id }) uploadId: string): Promise<void> {
    return this.service.cancel(context, uploadId);
  }
}
