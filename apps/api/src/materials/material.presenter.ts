import type { Material } from '@masswright/contracts';
import type { Actor } from '../platform/work';
import { mayEdit } from '../projects/project.policy';
import type { KnownMaterial } from './find-known-material';

export function presentMaterial(known: KnownMaterial, usedByParts: number, actor: Pick<Actor, 'role'>): Material {
  const { id, name, group, densityKgM3, densitySpreadKgM3, spreadBasis, source, origin, version, archivedAt } = known;
  return {
    id,
    name,
    group,
    densityKgM3,
    densitySpreadKgM3,
    spreadBasis,
    source,
    origin,
    version,
    archivedAt: archivedAt?.toISOString() ?? null,
    usedByParts,
    can: { edit: origin === 'own' && mayEdit(actor) },
  };
}
