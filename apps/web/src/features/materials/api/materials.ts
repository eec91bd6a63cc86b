import type { ChangeMaterialRequest, CreateMaterialRequest, ImportMaterialsAnswer, ImportMaterialsRequest, Material, MaterialList, MaterialUses } from '@masswright/contracts';
import { useMutation, useQuery, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { request } from '../../../lib/api';

export const materialsKey = ['materials'] as const;
const listKey = ['materials', 'list'] as const;
const usesKey = (materialId: string) => ['materials', 'uses', materialId] as const;
const at = '/api/v1/materials';

/** The whole library, starter and own, archived ones too: it is short, and what is shown of it is chosen here. */
export function useMaterials() {
  return useQuery({ queryKey: listKey, queryFn: ({ signal }) => request<MaterialList>('GET', `${at}?archived=true`, { signal }) });
}

/** For pickers: nothing to choose from until it is read. */
export function useMaterialItems(): readonly Material[] {
  return useMaterials().data?.items ?? [];
}

export function useMaterialUses(materialId: string) {
  return useQuery({ queryKey: usesKey(materialId), queryFn: ({ signal }) => request<MaterialUses>('GET', `${at}/${encodeURIComponent(materialId)}/parts`, { signal }) });
}

function keepMaterial(client: QueryClient, material: Material): Promise<void> {
  client.setQueryData<MaterialList>(listKey, (list) =>
    list && { ...list, items: list.items.some(({ id }) => id === material.id) ? list.items.map((item) => (item.id === material.id ? material : item)) : [...list.items, material] },
  );
  return client.invalidateQueries({ queryKey: materialsKey });
}

export function useCreateMaterial() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: CreateMaterialRequest) => request<Material>('POST', at, { body }),
    onSuccess: (material) => keepMaterial(client, material),
  });
}

export function useChangeMaterial() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ materialId, ...body }: ChangeMaterialRequest & { materialId: string }) => request<Material>('PATCH', `${at}/${encodeURIComponent(materialId)}`, { body }),
    onSuccess: (material) => keepMaterial(client, material),
  });
}

export function useImportMaterials() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: ImportMaterialsRequest) => request<ImportMaterialsAnswer>('POST', `${at}/import`, { body }),
    onSuccess: (_, { rehearse }) => (rehearse ? undefined : client.invalidateQueries({ queryKey: materialsKey })),
  });
}

export const materialsExportHref = `${at}/export`;
