import { Inject, Injectable } from '@nestjs/common';
import { measuringVersion, type ChangeSettingRequest, type FailedRecord, type Part, type Setting, type StatementRecord } from '@masswright/contracts';
import { addToOutbox, changeSetting, presentMeasurement, publishEvent, readSetting, refreshPartSummaries, renamePart, restartRun, type StoredPart, type Transaction } from '@masswright/drizzle';
import { checkShellDensities, summarisePart } from '@masswright/mechanics';
import { chooseDensity } from '../materials/choose-density';
import { AppError } from '../platform/app-error';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work } from '../platform/work';
import { requireEdit } from '../projects/project.policy';
import { presentStatement } from './part.presenter';
import { getPresentPart, getStoredPart, readPart } from './stored-part';

/** Densities of shells belong to shells that are there; a file that is measured yet has none. */
function requireFittingShells({ measurement }: StoredPart, setting: Setting): void {
  const unmeasured = setting.shellDensities?.length ? 'The mesh is not measured yet, so its shells are not known.' : undefined;
  const message = measurement === null ? unmeasured : checkShellDensities(presentMeasurement(measurement), setting);
  if (message !== undefined) throw new AppError('invalid-input', message, { fields: [{ path: 'shellDensities', message }] });
}

@Injectable()
export class PartsService {
  constructor(@Inject(Work) private readonly work: Work) {}

  get(context: SignedInContext, partId: string): Promise<Part> {
    return this.work.run(context, (tx, actor) => readPart(tx, partId, actor));
  }

  getStatement(context: SignedInContext, partId: string): Promise<StatementRecord | FailedRecord> {
    return this.work.run(context, async (tx) => {
      const record = presentStatement(await getStoredPart(tx, partId));
      if (record === undefined) throw new AppError('conflict', 'There is no statement yet: the file is not measured, or its unit is not stated.');
      return record;
    });
  }

  rename(context: SignedInContext, partId: string, name: string): Promise<Part> {
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const stored = await getPresentPart(tx, partId);
      await renamePart(tx, partId, name);
      await audit(tx, context, { action: 'part.rename', subject: { type: 'part', id: partId }, before: { name: stored.part.name }, after: { name } });
      await this.announce(tx, context, stored);
      return readPart(tx, partId, actor);
    });
  }

  changeSetting(context: SignedInContext, partId: string, request: ChangeSettingRequest): Promise<Part> {
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const stored = await getPresentPart(tx, partId);
      const before = readSetting(stored.setting);
      const { version, densityKgM3, densitySpreadKgM3, material, ...changes } = request;
      const density = await chooseDensity(tx, before, { densityKgM3, densitySpreadKgM3, material });
      const setting: Setting = { ...before, ...changes, ...density };
      if (changes.shellDensities !== undefined) requireFittingShells(stored, setting);
      const statesUnit = changes.lengthUnit !== undefined;
      const isChanged = await changeSetting(tx, { revisionId: stored.revision.id, version, setting, statesUnit, changedBy: context.userId });
      if (!isChanged) {
        throw new AppError('stale-version', `${stored.settingChangedByName} changed this setting meanwhile. Look at theirs, then make your change again.`);
      }
      await audit(tx, context, { action: 'setting.change', subject: { type: 'revision', id: stored.revision.id }, before, after: setting });
      await this.announce(tx, context, stored);
      return readPart(tx, partId, actor);
    });
  }

  /** Has a file read once more that could not be measured, or that an earlier measuring version measured: its bytes are still there. */
  measureAgain(context: SignedInContext, partId: string): Promise<Part> {
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const stored = await getPresentPart(tx, partId);
      const { run, measurement } = stored;
      if (run.state === 'done' && measurement?.measuringVersion === measuringVersion) throw new AppError('conflict', 'This file is measured; the same bytes give the same figures.');
      if (run.state === 'failed' || run.state === 'done') {
        const { organisationId, requestId } = context;
        const runId = await restartRun(tx, stored.revision.id);
        await addToOutbox(tx, { organisationId, job: 'measurement.run', payload: { organisationId, runId }, requestId });
        const before = run.state === 'failed' ? { code: run.errorCode } : { measurementId: measurement?.id, measuringVersion: measurement?.measuringVersion };
        await audit(tx, context, { action: 'measurement.restart', subject: { type: 'revision', id: stored.revision.id }, before });
        await this.announce(tx, context, stored);
      }
      return readPart(tx, partId, actor);
    });
  }

  private async announce(tx: Transaction, { organisationId }: SignedInContext, stored: StoredPart): Promise<void> {
    const { projectId, id: partId } = stored.part;
    await refreshPartSummaries(tx, organisationId, [partId], summarisePart);
    await publishEvent(tx, { organisationId, event: { type: 'part', projectId, partId } });
  }
}
