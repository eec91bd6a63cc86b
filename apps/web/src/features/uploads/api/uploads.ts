import type {
  ChangeSettingsRequest,
  CompleteUploadRequest,
  CreateUploadRequest,
  NameMatches,
  OpenUploads,
  Part,
  PartGrants,
  SettingsChange,
  StorageUse,
  Upload,
} from '@masswright/contracts';
import { useQuery } from '@tanstack/react-query';
import { api, expectDone, unwrap, unwrapAs } from '../../../lib/api';

export const createUpload = (projectId: string, body: CreateUploadRequest): Promise<Upload> =>
  unwrap(api.POST('/api/v1/projects/{projectId}/uploads', { params: { path: { projectId } }, body }));

export const listOpenUploads = (projectId: string): Promise<OpenUploads> => unwrap(api.GET('/api/v1/projects/{projectId}/uploads', { params: { path: { projectId } } }));

export const findNameMatches = (projectId: string, fileNames: string[]): Promise<NameMatches> =>
  unwrap(api.POST('/api/v1/projects/{projectId}/name-matches', { params: { path: { projectId } }, body: { fileNames } }));

export const readUpload = (uploadId: string): Promise<Upload> => unwrap(api.GET('/api/v1/uploads/{uploadId}', { params: { path: { uploadId } } }));

export const grantPart = (uploadId: string, partNumber: number, sha256: string, signal?: AbortSignal): Promise<PartGrants> =>
  unwrap(api.POST('/api/v1/uploads/{uploadId}/part-grants', { params: { path: { uploadId } }, body: { parts: [{ partNumber, sha256 }] }, signal }));

export const completeUpload = (uploadId: string, body: CompleteUploadRequest): Promise<Part> =>
  unwrapAs<Part>(api.POST('/api/v1/uploads/{uploadId}/completion', { params: { path: { uploadId } }, body }));

export const cancelUpload = (uploadId: string): Promise<void> => expectDone(api.DELETE('/api/v1/uploads/{uploadId}', { params: { path: { uploadId } }, keepalive: true }));

export const readPartOfUpload = (partId: string): Promise<Part> => unwrapAs<Part>(api.GET('/api/v1/parts/{partId}', { params: { path: { partId } } }));

/** States unit and density of parts that are there already. */
export const stateSettings = (projectId: string, body: Pick<ChangeSettingsRequest, 'change'> & { parts: { ids: string[] } }): Promise<SettingsChange> =>
  unwrapAs<SettingsChange>(api.POST('/api/v1/projects/{projectId}/setting-changes', { params: { path: { projectId } }, body }));

/** What the organisation's files take, asked for while the dialog is open. */
export const useStorageUse = () => useQuery({ queryKey: ['storage-use'], queryFn: ({ signal }) => unwrap<StorageUse>(api.GET('/api/v1/storage-use', { signal })), staleTime: 60_000 });
