import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import type { CreateMaterialRequest, ImportMaterialsAnswer, ImportMaterialsRequest } from '@masswright/contracts';
import { changeMaterial, insertMaterials, listMaterials, publishEvent, type Transaction } from '@masswright/drizzle';
import { findStarterMaterialByName, materialNameKey, starterLibrary } from '@masswright/mechanics';
import { AppError } from '../platform/app-error';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work } from '../platform/work';
import { requireEdit } from '../projects/project.policy';
import { knowOwn, knowStarter, type KnownMaterial } from './find-known-material';
import { readMaterialsCsv, writeMaterialsCsv, type ImportError, type ReadMaterial } from './materials-csv';

interface Plan {
  added: ReadMaterial[];
  changed: { known: KnownMaterial; material: CreateMaterialRequest }[];
  unchanged: number;
  errors: ImportError[];
}

const isSame = (known: KnownMaterial, material: CreateMaterialRequest): boolean =>
  known.archivedAt === null &&
  known.name === material.name &&
  known.group === material.group &&
  known.densityKgM3 === material.densityKgM3 &&
  known.densitySpreadKgM3 === material.densitySpreadKgM3 &&
  known.spreadBasis === material.spreadBasis &&
  known.source === material.source;

/** What a table would do to the library. */
function planImport(own: readonly KnownMaterial[], { read, errors }: ReturnType<typeof readMaterialsCsv>): Plan {
  const ownByName = new Map(own.map((one) => [materialNameKey(one.name), one]));
  const plan: Plan = { added: [], changed: [], unchanged: 0, errors: [...errors] };
  for (const one of read) {
    const { row, material } = one;
    const starter = findStarterMaterialByName(material.name);
    const known = starter === undefined ? ownByName.get(materialNameKey(material.name)) : knowStarter(starter);
    if (known === undefined) plan.added.push(one);
    else if (isSame(known, material)) plan.unchanged += 1;
    else if (known.origin === 'own') plan.changed.push({ known, material });
    else plan.errors.push({ row, column: 'name', message: `${known.name} is in the library that every installation has, with other values, and can’t be changed. Give yours another name.` });
  }
  plan.errors.sort((a, b) => a.row - b.row);
  return plan;
}

/** The library as a table, out and in. */
@Injectable()
export class MaterialTablesService {
  constructor(@Inject(Work) private readonly work: Work) {}

  /** Everything that can be chosen: the starter library and the organisation's own, archived ones left out. */
  write(context: SignedInContext): Promise<string> {
    return this.work.run(context, async (tx) => writeMaterialsCsv([...starterLibrary.map(knowStarter), ...(await listMaterials(tx)).map(knowOwn).filter(({ archivedAt }) => archivedAt === null)]));
  }

  /** Takes the good rows in one transaction and names the others; a rehearsal says the same and changes nothing. */
  read(context: SignedInContext, { csv, rehearse }: ImportMaterialsRequest): Promise<ImportMaterialsAnswer> {
    const table = readMaterialsCsv(csv);
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const plan = planImport((await listMaterials(tx)).map(knowOwn), table);
      if (!rehearse) await this.carryOut(tx, context, plan);
      return { added: plan.added.length, changed: plan.changed.length, unchanged: plan.unchanged, errors: plan.errors };
    });
  }

  private async carryOut(tx: Transaction, context: SignedInContext, { added, changed }: Plan): Promise<void> {
    const { organisationId, userId } = context;
    if (added.length + changed.length === 0) return;
    const rows = added.map(({ material }) => ({ ...material, id: randomUUID(), organisationId, changedBy: userId }));
    for (let at = 0; at < rows.length; at += 1000) await insertMaterials(tx, rows.slice(at, at + 1000));
    for (const { known, material } of changed) {
      // An archived one that stands in a table is wanted again.
      const isChanged = await changeMaterial(tx, { materialId: known.id, version: known.version, fields: material, archived: false, changedBy: userId });
      if (!isChanged) throw new AppError('stale-version', `Somebody changed ${known.name} at the same moment. Look again, then import again.`);
    }
    await audit(tx, context, {
      action: 'material.import',
      subject: { type: 'organisation', id: organisationId },
      before: changed.map(({ known }) => known),
      after: { added: rows.map(({ organisationId: _, changedBy: __, ...row }) => row), changed: changed.map(({ known, material }) => ({ id: known.id, ...material })) },
    });
    await publishEvent(tx, { organisationId, event: { type: 'materials' } });
  }
}
