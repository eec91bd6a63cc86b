import type { CompleteUploadRequest, CreateUploadRequest, Part, PartGrants, Upload } from '@masswright/contracts';
import { api, expectDone, unwrap, unwrapAs } from '../../../lib/api';

export const createUpload = (projectId: string, body: CreateUploadRequest): Promise<Upload> =>
  unwrap(api.POST('/api/v1/projects/{projectId}/uploads', { params: { path: { projectId } }, body }));

export const readUpload = (uploadId: string): Promise<Upload> => unwrap(api.GET('/api/v1/uploads/{uploadId}', { params: { path: { uploadId } } }));

export const grantPart = (uploadId: string, partNumber: number, signal?: AbortSignal): Promise<PartGrants> =>
  unwrap(api.POST('/api/v1/uploads/{uploadId}/part-grants', { params: { path: { uploadId } }, body: { partNumbers: [partNumber] }, signal }));

export const completeUpload = (uploadId: string, body: CompleteUploadRequest, signal?: AbortSignal): Promise<Part> =>
  unwrapAs<Part>(api.POST('/api/v1/uploads/{uploadId}/completion', { params: { path: { uploadId } }, body, signal }));

export const cancelUpload = (uploadId: string): Promise<void> => expectDone(api.DELETE('/api/v1/uploads/{uploadId}', { params: { path: { uploadId } }, keepalive: true }));

export const readPartOfUpload = (partId: string): Promise<Part> => unwrapAs<Part>(api.GET('/api/v1/parts/{partId}', { params: { path: { partId } } }));
