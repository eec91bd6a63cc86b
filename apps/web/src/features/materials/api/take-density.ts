import type { Material, MaterialUse, SettingsChange } from '@masswright/contracts';
import { api, unwrap } from '../../../lib/api';

/** Gives parts the present density of the material that they are set to: one change a project, since a change belongs to one. */
export async function takePresentDensity(material: Pick<Material, 'id'>, uses: readonly MaterialUse[]): Promise<SettingsChange[]> {
  const changes: SettingsChange[] = [];
  for (const projectId of new Set(uses.map((use) => use.projectId))) {
    const ids = uses.filter((use) => use.projectId === projectId).map(({ partId }) => partId);
    const body = { parts: { ids }, change: { material: { id: material.id } } };
    changes.push(await unwrap(api.POST('/api/v1/projects/{projectId}/setting-changes', { params: { path: { projectId } }, body })));
  }
  return changes;
}

/** Takes all of it back; what comes of that can be taken back in turn. */
export async function takeBack(changes: readonly SettingsChange[]): Promise<SettingsChange[]> {
  const reversed: SettingsChange[] = [];
  for (const { id } of changes) reversed.push(await unwrap(api.POST('/api/v1/setting-changes/{changeId}/undo', { params: { path: { changeId: id } } })));
  return reversed;
}
