import { Body, Controller, Delete, Get, Inject, Param, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  completeUploadRequest,
  createUploadRequest,
  findNameMatchesRequest,
  grantPartsRequest,
  id,
  nameMatches,
  openUploads,
  part,
  partGrants,
  storageUse,
  upload,
  type CompleteUploadRequest,
  type CreateUploadRequest,
  type FindNameMatchesRequest,
  type GrantPartsRequest,
  type NameMatches,
  type OpenUploads,
  type Part,
  type PartGrants,
  type StorageUse,
  type Upload,
} from '@masswright/contracts';
import { Operation } from '../platform/operation';
import { SignedIn, type SignedInContext } from '../platform/request-context';
import { UploadCompletionService } from './upload-completion.service';
import { UploadsService } from './uploads.service';

@ApiTags('uploads')
@Controller()
export class UploadsController {
  constructor(
    @Inject(UploadsService) private readonly service: UploadsService,
    @Inject(UploadCompletionService) private readonly completion: UploadCompletionService,
  ) {}

  @Post('projects/:projectId/uploads')
  @Operation({ summary: 'Announce a mesh file to be sent', status: 201, answer: upload })
  create(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string, @Body({ schema: createUploadRequest }) request: CreateUploadRequest): Promise<Upload> {
    return this.service.create(context, projectId, request);
  }

  @Get('projects/:projectId/uploads')
  @Operation({ summary: 'What you began to send to a project and did not finish', answer: openUploads })
  listOpen(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string): Promise<OpenUploads> {
    return this.service.listOpen(context, projectId);
  }

  @Post('projects/:projectId/name-matches')
  @Operation({ summary: 'Parts whose file has one of these names: candidates for a next revision', answer: nameMatches })
  findNameMatches(@SignedIn() context: SignedInContext, @Param('projectId', { schema: id }) projectId: string, @Body({ schema: findNameMatchesRequest }) request: FindNameMatchesRequest): Promise<NameMatches> {
    return this.service.findNameMatches(context, projectId, request);
  }

  @Get('storage-use')
  @Operation({ summary: 'What the organisation’s files take in the storage, and how much they may', answer: storageUse })
  getStorageUse(@SignedIn() context: SignedInContext): Promise<StorageUse> {
    return this.service.getStorageUse(context);
  }

  @Get('uploads/:uploadId')
  @Operation({ summary: 'How far an upload is', answer: upload })
  get(@SignedIn() context: SignedInContext, @Param('uploadId', { schema: id }) uploadId: string): Promise<Upload> {
    return this.service.get(context, uploadId);
  }

  @Post('uploads/:uploadId/part-grants')
  @Operation({ summary: 'Addresses of the storage to which parts can be PUT', answer: partGrants })
  grantParts(@SignedIn() context: SignedInContext, @Param('uploadId', { schema: id }) uploadId: string, @Body({ schema: grantPartsRequest }) request: GrantPartsRequest): Promise<PartGrants> {
    return this.service.grantParts(context, uploadId, request);
  }

  @Post('uploads/:uploadId/completion')
  @Operation({ summary: 'Make a part, or a part’s next revision, of a wholly sent file and have it measured', status: 201, answer: part })
  complete(@SignedIn() context: SignedInContext, @Param('uploadId', { schema: id }) uploadId: string, @Body({ schema: completeUploadRequest }) request: CompleteUploadRequest): Promise<Part> {
    return this.completion.complete(context, uploadId, request);
  }

  @Delete('uploads/:uploadId')
  @Operation({ summary: 'Cancel an upload', status: 204 })
  cancel(@SignedIn() context: SignedInContext, @Param('uploadId', { schema: id }) uploadId: string): Promise<void> {
    return this.service.cancel(context, uploadId);
  }
}
