import { isDeepStrictEqual } from 'node:util';
import type { ChangeSettingsRequest, Setting } from '@masswright/contracts';
import type { CurrentSetting, SettingAfter, SettingBefore } from '@masswright/drizzle';
import type { ChosenDensity } from '../materials/choose-density';

/** The setting by itself, without when its unit was stated. */
function settingOf({ unitStatedAt: _, unitStatedBy: __, ...setting }: SettingBefore): Setting {
  return setting;
}

/** When and by whom the unit is stated after a change that was made now. */
export interface Moment {
  at: string;
  by: string;
}

function unitStatedAfter(before: SettingBefore, lengthUnit: Setting['lengthUnit'] | undefined, now: Moment): Pick<SettingBefore, 'unitStatedAt' | 'unitStatedBy'> {
  if (lengthUnit === undefined) return { unitStatedAt: before.unitStatedAt, unitStatedBy: before.unitStatedBy };
  return lengthUnit === null ? { unitStatedAt: null, unitStatedBy: null } : { unitStatedAt: now.at, unitStatedBy: now.by };
}

/**
 * What one change for many makes of one setting; undefined where the setting is so already. A unit that was only taken over from the revision before is
 * changed by being stated, even where it is the same.
 */
export function changeOfSetting(current: CurrentSetting, change: ChangeSettingsRequest['change'], choose: (before: Setting) => ChosenDensity, now: Moment): SettingAfter | undefined {
  const { before, revisionId, version } = current;
  const was = settingOf(before);
  const setting: Setting = {
    ...was,
    ...choose(was),
    ...(change.lengthUnit === undefined ? {} : { lengthUnit: change.lengthUnit }),
    ...(change.axis === undefined ? {} : { axis: change.axis }),
  };
  const statesAnew = typeof change.lengthUnit === 'string' && before.unitStatedAt === null;
  if (!statesAnew && isDeepStrictEqual(setting, was)) return undefined;
  // A unit that stands and was stated stays stated by whom it was.
  const says = statesAnew || setting.lengthUnit !== was.lengthUnit ? change.lengthUnit : undefined;
  return { revisionId, version, setting, ...unitStatedAfter(before, says, now) };
}

/** Puts a setting back as it was. */
export function restoreSetting(current: CurrentSetting, before: SettingBefore): SettingAfter {
  const { unitStatedAt, unitStatedBy } = before;
  return { revisionId: current.revisionId, version: current.version, setting: settingOf(before), unitStatedAt, unitStatedBy };
}
