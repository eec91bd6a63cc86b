import type { ChangeMaterialRequest, CreateMaterialRequest, ImportMaterialsRequest, Material, MaterialList } from '@masswright/contracts';
import { useMutation, useQuery, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { api, unwrap } from '../../../lib/api';

export const materialsKey = ['materials'] as const;
const listKey = ['materials', 'list'] as const;
const usesKey = (materialId: string) => ['materials', 'uses', materialId] as const;

/** The whole library, starter and own, archived ones too: it is short, and what is shown of it is chosen here. */
export function useMaterials() {
  return useQuery({ queryKey: listKey, queryFn: ({ signal }) => unwrap(api.GET('/api/v1/materials', { params: { query: { archived: 'true' } }, signal })) });
}

/** For pickers: nothing to choose from until it is read. */
export function useMaterialItems(): readonly Material[] {
  return useMaterials().data?.items ?? [];
}

export function useMaterialUses(materialId: string) {
  return useQuery({ queryKey: usesKey(materialId), queryFn: ({ signal }) => unwrap(api.GET('/api/v1/materials/{materialId}/parts', { params: { path: { materialId } }, signal })) });
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
    mutationFn: (body: CreateMaterialRequest) => unwrap(api.POST('/api/v1/materials', { body })),
    onSuccess: (material) => keepMaterial(client, material),
  });
}

export function useChangeMaterial() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ materialId, ...body }: ChangeMaterialRequest & { materialId: string }) => unwrap(api.PATCH('/api/v1/materials/{materialId}', { params: { path: { materialId } }, body })),
    onSuccess: (material) => keepMaterial(client, material),
  });
}

export function useImportMaterials() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: ImportMaterialsRequest) => unwrap(api.POST('/api/v1/materials/import', { body })),
    onSuccess: (_, { rehearse }) => (rehearse ? undefined : client.invalidateQueries({ queryKey: materialsKey })),
  });
}

export const materialsExportHref = '/api/v1/materials/export';
