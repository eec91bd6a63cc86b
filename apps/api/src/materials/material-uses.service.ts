import { Inject, Injectable } from '@nestjs/common';
import type { MaterialUse, MaterialUses, Setting } from '@masswright/contracts';
import { findParts, findPartsOfMaterial, presentMeasurement, readSetting, type StoredPart } from '@masswright/drizzle';
import { computeStatement } from '@masswright/mechanics';
import { revisionLetter } from '../parts/part.presenter';
import { notFound } from '../platform/app-error';
import type { SignedInContext } from '../platform/request-context';
import { Work } from '../platform/work';
import { findKnownMaterial, type KnownMaterial } from './find-known-material';

const mostShown = 500;

function compute(stored: StoredPart, setting: Setting) {
  return stored.measurement === null ? undefined : computeStatement(presentMeasurement(stored.measurement), setting, { file: '', sha256: '' });
}

function presentUse(stored: StoredPart, present: KnownMaterial): MaterialUse {
  const setting = readSetting(stored.setting);
  const kept = compute(stored, setting);
  const verdict = kept?.weighing?.verdict;
  const isWeighed = verdict === 'agrees' || verdict === 'unchecked';
  const moved = compute(stored, { ...setting, densityKgM3: present.densityKgM3, densitySpreadKgM3: present.densitySpreadKgM3 });
  return {
    partId: stored.part.id,
    projectId: stored.part.projectId,
    projectName: stored.part.projectName,
    number: stored.part.number,
    name: stored.part.name,
    letter: revisionLetter(stored.revision.ordinal),
    densityKgM3: setting.densityKgM3 ?? present.densityKgM3,
    massKg: kept?.massKg ?? null,
    massAtPresentDensityKg: isWeighed ? null : (moved?.massKg ?? null),
  };
}

/** What a material's present density would make of the parts that are set to it: a setting keeps the density that it was made with. */
@Injectable()
export class MaterialUsesService {
  constructor(@Inject(Work) private readonly work: Work) {}

  list(context: SignedInContext, materialId: string): Promise<MaterialUses> {
    return this.work.run(context, async (tx) => {
      const present = await findKnownMaterial(tx, materialId);
      if (present === undefined) throw notFound('material');
      const partIds = await findPartsOfMaterial(tx, materialId);
      const stored = await findParts(tx, partIds.slice(0, mostShown));
      return { items: stored.map((one) => presentUse(one, present)), total: partIds.length };
    });
  }
}
