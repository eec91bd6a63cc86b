import type { ChangeSettingsRequest, MovedParts, SettingsChange } from '@masswright/contracts';
import { api, unwrap, unwrapAs } from '../../../lib/api';
import type { ChosenParts } from '../model/selection';

export function changeSettings(projectId: string, parts: ChosenParts, change: ChangeSettingsRequest['change']): Promise<SettingsChange> {
  return unwrapAs<SettingsChange>(api.POST('/api/v1/projects/{projectId}/setting-changes', { params: { path: { projectId } }, body: { parts, change } }));
}

/** Takes a change back; that is a change of its own, and can be taken back in turn. */
export function undoSettingsChange(changeId: string): Promise<SettingsChange> {
  return unwrap(api.POST('/api/v1/setting-changes/{changeId}/undo', { params: { path: { changeId } } }));
}

export function deleteParts(projectId: string, parts: ChosenParts): Promise<MovedParts> {
  return unwrap(api.POST('/api/v1/projects/{projectId}/part-deletions', { params: { path: { projectId } }, body: { parts } }));
}

export function restoreParts(projectId: string, parts: ChosenParts): Promise<MovedParts> {
  return unwrap(api.POST('/api/v1/projects/{projectId}/part-restorations', { params: { path: { projectId } }, body: { parts } }));
}
