import type { Material, MaterialUse, SettingsChange } from '@masswright/contracts';
import { api, unwrap } from '../../../lib/api';
import { changeEach, type DensityOutcome } from '../model/change-each';

/** Gives parts the present density of the material that they are set to: one change a project, since a change belongs to one. */
export function takePresentDensity(material: Pick<Material, 'id'>, uses: readonly MaterialUse[]): Promise<DensityOutcome> {
  return changeEach(new Set(uses.map((use) => use.projectId)), (projectId) => {
    const ids = uses.filter((use) => use.projectId === projectId).map(({ partId }) => partId);
    const body = { parts: { ids }, change: { material: { id: material.id } } };
    return unwrap(api.POST('/api/v1/projects/{projectId}/setting-changes', { params: { path: { projectId } }, body }));
  });
}

/** Takes all of it back; what comes of that can be taken back in turn. */
export function takeBack(changes: readonly SettingsChange[]): Promise<DensityOutcome> {
  return changeEach(changes, ({ id }) => unwrap(api.POST('/api/v1/setting-changes/{changeId}/undo', { params: { path: { changeId: id } } })));
}
