import type { ChangeSettingsRequest } from '@masswright/contracts';

/** A change of the settings of some parts. */
export interface BulkChange {
  change: ChangeSettingsRequest['change'];
  /** What is changed, and to what, for the sentence about it. */
  about: string;
  to: string;
}
