import type { ChangeSettingRequest, Part, RenamePartRequest } from '@masswright/contracts';
import { useMutation, useQuery, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { api, unwrapAs } from '../../../lib/api';
import { partKey, partsKey } from './keys';

export function readPart(partId: string, signal?: AbortSignal): Promise<Part> {
  return unwrapAs<Part>(api.GET('/api/v1/parts/{partId}', { params: { path: { partId } }, signal }));
}

export function usePart(partId: string) {
  return useQuery({ queryKey: partKey(partId), queryFn: ({ signal }) => readPart(partId, signal) });
}

/** Saved also while the page is being left, so it must not depend on a component that is still there. */
export function changeSetting(partId: string, body: ChangeSettingRequest): Promise<Part> {
  return unwrapAs<Part>(api.PATCH('/api/v1/parts/{partId}/setting', { params: { path: { partId } }, body, keepalive: true }));
}

/** Puts an answer where the page reads it; the list is read again, since its figures follow. */
export function keepPart(client: QueryClient, part: Part): void {
  client.setQueryData(partKey(part.id), part);
  void client.invalidateQueries({ queryKey: partsKey(part.projectId) });
}

export function useRenamePart(partId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: RenamePartRequest) => unwrapAs<Part>(api.PATCH('/api/v1/parts/{partId}', { params: { path: { partId } }, body })),
    onSuccess: (part) => keepPart(client, part),
  });
}

/** States a unit for this very file, also where it is the one that was taken over: then nobody doubts it any more. */
export function useStateUnit() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ partId, lengthUnit, version }: Required<Pick<ChangeSettingRequest, 'lengthUnit' | 'version'>> & { partId: string }) => changeSetting(partId, { lengthUnit, version }),
    onSuccess: (part) => keepPart(client, part),
  });
}

/** Has a file that failed measured once more. */
export function useMeasureAgain() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (partId: string) => unwrapAs<Part>(api.POST('/api/v1/parts/{partId}/run', { params: { path: { partId } } })),
    onSuccess: (part) => keepPart(client, part),
  });
}
