import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import type { ChangeMaterialRequest, CreateMaterialRequest, Material, MaterialList, MaterialListQuery } from '@masswright/contracts';
import { changeMaterial, countMaterialUses, insertMaterials, isMaterialNameTaken, listMaterials, publishEvent, type Transaction } from '@masswright/drizzle';
import { findStarterMaterial, findStarterMaterialByName, starterLibrary } from '@masswright/mechanics';
import { AppError, notFound } from '../platform/app-error';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work } from '../platform/work';
import { mayEdit, requireEdit } from '../projects/project.policy';
import { findKnownMaterial, knowOwn, knowStarter, type KnownMaterial } from './find-known-material';
import { presentMaterial } from './material.presenter';

const nameTaken = (message: string) => new AppError('conflict', message, { fields: [{ path: 'name', message }] });

async function requireFreeName(tx: Transaction, name: string, exceptId?: string): Promise<void> {
  const starter = findStarterMaterialByName(name);
  if (starter !== undefined) throw nameTaken(`${starter.name} is in the library that every installation has. Give yours another name.`);
  if (await isMaterialNameTaken(tx, name, exceptId)) throw nameTaken('There is a material of this name already, perhaps an archived one.');
}

function matches(material: KnownMaterial, words: readonly string[]): boolean {
  const text = [material.name, material.group, material.source].join('\n').normalize('NFC').toLowerCase();
  return words.every((word) => text.includes(word));
}

/** The library: what every installation has, and the organisation's own beside it. */
@Injectable()
export class MaterialsService {
  constructor(@Inject(Work) private readonly work: Work) {}

  list(context: SignedInContext, { text, archived }: MaterialListQuery): Promise<MaterialList> {
    const words = text.normalize('NFC').toLowerCase().split(/\s+/u).filter((word) => word !== '');
    return this.work.run(context, async (tx, actor) => {
      const own = (await listMaterials(tx)).map(knowOwn).filter(({ archivedAt }) => archived || archivedAt === null);
      const uses = await countMaterialUses(tx);
      const known = [...starterLibrary.map(knowStarter), ...own].filter((one) => matches(one, words));
      return { items: known.map((one) => presentMaterial(one, uses.get(one.id) ?? 0, actor)), can: { create: mayEdit(actor) } };
    });
  }

  create(context: SignedInContext, request: CreateMaterialRequest): Promise<Material> {
    const { organisationId, userId } = context;
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      await requireFreeName(tx, request.name);
      const id = randomUUID();
      await insertMaterials(tx, [{ ...request, id, organisationId, changedBy: userId }]);
      await audit(tx, context, { action: 'material.create', subject: { type: 'material', id }, after: request });
      await publishEvent(tx, { organisationId, event: { type: 'materials' } });
      return presentMaterial(await this.getOwn(tx, id), 0, actor);
    });
  }

  change(context: SignedInContext, materialId: string, { version, archived, ...fields }: ChangeMaterialRequest): Promise<Material> {
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const before = await this.getOwn(tx, materialId);
      if (fields.name !== undefined) await requireFreeName(tx, fields.name, materialId);
      if (!(await changeMaterial(tx, { materialId, version, fields, archived, changedBy: context.userId }))) {
        throw new AppError('stale-version', 'Somebody changed this material meanwhile. Look at theirs, then make your change again.');
      }
      await audit(tx, context, { action: 'material.change', subject: { type: 'material', id: materialId }, before, after: { ...fields, archived } });
      await publishEvent(tx, { organisationId: context.organisationId, event: { type: 'materials' } });
      const uses = await countMaterialUses(tx);
      return presentMaterial(await this.getOwn(tx, materialId), uses.get(materialId) ?? 0, actor);
    });
  }

  /** One of the organisation's own. @throws AppError conflict where it is of the starter library, which nobody changes */
  private async getOwn(tx: Transaction, materialId: string): Promise<KnownMaterial> {
    if (findStarterMaterial(materialId) !== undefined) {
      throw new AppError('conflict', 'This material is of the library that every installation has, and can’t be changed. Make one of your own under another name.');
    }
    const known = await findKnownMaterial(tx, materialId);
    if (known === undefined) throw notFound('material');
    return known;
  }
}
