import { randomUUID } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import type { ChangeSettingsRequest, SettingsChange } from '@masswright/contracts';
import {
  findCurrentSettings,
  findReversal,
  findSettingsChange,
  holdParts,
  insertSettingsChange,
  listSettingsChangeItems,
  publishEvent,
  refreshPartSummaries,
  writeSettings,
  type CurrentSetting,
  type SettingAfter,
  type Transaction,
} from '@masswright/drizzle';
import { summarisePart } from '@masswright/mechanics';
import { prepareDensityChoice } from '../materials/choose-density';
import { selectParts } from '../part-list/select-parts';
import { AppError, notFound } from '../platform/app-error';
import type { SignedInContext } from '../platform/request-context';
import { audit, Work, type Actor } from '../platform/work';
import { requireEdit } from '../projects/project.policy';
import { changeOfSetting, restoreSetting } from './change-of-setting';
import { nothingToRestore, separateDeleted, sortOutRestorable, type LeftPart } from './sort-out-restorable';

/** One setting that is going to be other than it was. */
interface Step {
  current: CurrentSetting;
  after: SettingAfter;
}

interface Outcome {
  projectId: string;
  steps: Step[];
  unchanged: number;
  left: LeftPart[];
  reverses: string | null;
  /** What the audit says of it. */
  said: unknown;
}

const mostNamed = 100;

/** Changes of many settings at once, and taking them back. */
@Injectable()
export class SettingsChangesService {
  constructor(@Inject(Work) private readonly work: Work) {}

  change(context: SignedInContext, projectId: string, { parts, change }: ChangeSettingsRequest): Promise<SettingsChange> {
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const selected = await selectParts(tx, projectId, parts);
      const { present, deleted } = separateDeleted(selected);
      const choose = await prepareDensityChoice(tx, change);
      const now = { at: new Date().toISOString(), by: context.userId };
      const settings = await findCurrentSettings(tx, present.map(({ id }) => id));
      const steps = settings.flatMap((current) => {
        const after = changeOfSetting(current, change, choose, now);
        return after === undefined ? [] : [{ current, after }];
      });
      return this.write(tx, context, actor, { projectId, steps, unchanged: settings.length - steps.length, left: deleted, reverses: null, said: change });
    });
  }

  /**
   * Takes a change back, as far as nobody has changed the same since; doing so is a change of its own, which can be taken back in turn. Where nothing can
   * be put back it is refused, and not used up.
   */
  undo(context: SignedInContext, changeId: string): Promise<SettingsChange> {
    return this.work.run(context, async (tx, actor) => {
      requireEdit(actor);
      const change = await findSettingsChange(tx, changeId);
      if (change === undefined) throw notFound('change');
      const items = await listSettingsChangeItems(tx, changeId);
      const held = await holdParts(tx, items.map(({ partId }) => partId));
      // Asked only now: of two at once, the second has waited for the first and learns of it.
      const reversal = await findReversal(tx, changeId);
      if (reversal !== undefined) throw new AppError('conflict', `${reversal.byName} has taken this change back already. To have it again, take that back.`);
      const settings = await findCurrentSettings(tx, items.map(({ partId }) => partId));
      const { restorable, left } = sortOutRestorable(items, held, settings);
      if (restorable.length === 0 && left.length > 0) throw nothingToRestore(left);
      const steps = restorable.map(({ current, before }) => ({ current, after: restoreSetting(current, before) }));
      return this.write(tx, context, actor, { projectId: change.projectId, steps, unchanged: 0, left, reverses: changeId, said: { reverses: changeId } });
    });
  }

  private async write(tx: Transaction, context: SignedInContext, actor: Actor, { projectId, steps, unchanged, left, reverses, said }: Outcome): Promise<SettingsChange> {
    const { organisationId, userId } = context;
    const id = randomUUID();
    const written = await writeSettings(tx, steps.map(({ after }) => after), userId);
    // The parts are held, so nobody else can have come between; should it ever happen, nothing at all is changed.
    if (written.length !== steps.length) throw new AppError('stale-version', 'Somebody changed some of these settings at the same moment. Look again, then make your change again.');
    const items = steps.map(({ current, after }) => ({ revisionId: current.revisionId, before: current.before, versionAfter: after.version + 1 }));
    const createdAt = await insertSettingsChange(tx, { id, organisationId, projectId, reverses, createdBy: userId }, items);
    await refreshPartSummaries(tx, organisationId, steps.map(({ current }) => current.partId), summarisePart);
    const counts = { changed: steps.length, unchanged, left: left.length };
    await audit(tx, context, { action: reverses === null ? 'settings.change' : 'settings.undo', subject: { type: 'settings-change', id }, after: { projectId, said, ...counts } });
    if (steps.length > 0) await publishEvent(tx, { organisationId, event: { type: 'parts', projectId } });
    return { id, projectId, changed: steps.length, unchanged, left: left.slice(0, mostNamed), reverses, createdAt: createdAt.toISOString(), createdBy: actor.name };
  }
}
