import type { ChangeSettingRequest, MeasuringRun, Page, Part, PartRow, RenamePartRequest, ServerEvent } from '@masswright/contracts';
import { useInfiniteQuery, useMutation, useQuery, useQueryClient, type InfiniteData, type QueryClient } from '@tanstack/react-query';
import { api, unwrapAs } from '../../../lib/api';

export const partsKey = (projectId: string) => ['parts', projectId] as const;
export const partKey = (partId: string) => ['part', partId] as const;

const pageSize = 100;

export function useParts(projectId: string) {
  return useInfiniteQuery({
    queryKey: partsKey(projectId),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: (page: Page<PartRow>) => page.next ?? undefined,
    queryFn: ({ pageParam, signal }) =>
      unwrapAs<Page<PartRow>>(api.GET('/api/v1/projects/{projectId}/parts', { params: { path: { projectId }, query: { after: pageParam, limit: pageSize } }, signal })),
  });
}

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

type RunEvent = Extract<ServerEvent, { type: 'run' }>;

const withRun = (run: MeasuringRun, event: RunEvent): MeasuringRun => ({ ...run, state: event.state, stage: event.stage, progress: event.progress });

/** Shows at once how far a run is; its figures, or its reason, are then read from the api. */
export function applyRun(client: QueryClient, event: RunEvent): void {
  client.setQueryData<Part>(partKey(event.partId), (part) =>
    part && { ...part, revision: { ...part.revision, run: withRun(part.revision.run, event) } },
  );
  client.setQueryData<InfiniteData<Page<PartRow>>>(partsKey(event.projectId), (data) =>
    data && {
      ...data,
      pages: data.pages.map((page) =>
        page.items.some((row) => row.id === event.partId)
          ? {
              ...page,
              items: page.items.map((row) =>
                row.id === event.partId ? { ...row, revision: { ...row.revision, run: withRun(row.revision.run, event) } } : row,
              ),
            }
          : page,
      ),
    },
  );
}
