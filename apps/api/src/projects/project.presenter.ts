import type { Project } from '@masswright/contracts';
import type { ProjectRow } from '@masswright/drizzle';
import type { Actor } from '../platform/work';
import { mayEdit } from './project.policy';

export function presentProject(row: ProjectRow, actor: Pick<Actor, 'role'>): Project {
  return {
    id: row.id,
    name: row.name,
    parts: row.parts,
    createdAt: row.createdAt.toISOString(),
    can: { rename: mayEdit(actor), addMeshes: mayEdit(actor) },
  };
}
