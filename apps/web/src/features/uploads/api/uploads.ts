import type { CompleteUploadRequest, CreateUploadRequest, Part, PartGrants, Upload } from '@masswright/contracts';
import { send } from '../../../lib/api';

export const createUpload = (projectId: string, body: CreateUploadRequest): Promise<Upload> =>
  send<Upload>('POST', `/projects/${projectId}/uploads`, { body });

export const readUpload = (uploadId: string): Promise<Upload> => send<Upload>('GET', `/uploads/${uploadId}`);

export const grantPart = (uploadId: string, partNumber: number, signal?: AbortSignal): Promise<PartGrants> =>
  send<PartGrants>('POST', `/uploads/${uploadId}/part-grants`, { body: { partNumbers: [partNumber] }, signal });

export const completeUpload = (uploadId: string, body: CompleteUploadRequest, signal?: AbortSignal): Promise<Part> =>
  send<Part>('POST', `/uploads/${uploadId}/completion`, { body, signal });

export const cancelUpload = (uploadId: string): Promise<void> => send<void>('DELETE', `/uploads/${uploadId}`, { keepalive: true });
