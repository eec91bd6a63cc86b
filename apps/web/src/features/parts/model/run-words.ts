import type { MeasuringRun } from '@masswright/contracts';
import { formatCount } from '@masswright/units';

const stageWords: Record<MeasuringRun['stage'], string> = {
  waiting: 'Waiting for its turn',
  hashing: 'Comparing with known files',
  reading: 'Reading the file',
  measuring: 'Measuring',
  examining: 'Examining',
  storing: 'Storing the figures',
};

/** How far a file is, in words that fit a row. */
export function describeRun({ state, stage, progress }: Pick<MeasuringRun, 'state' | 'stage' | 'progress'>): string {
  if (state === 'failed') return 'Not measured';
  // The figures themselves are on their way to the page.
  if (state === 'done') return 'Measured, reading the figures';
  if (state === 'queued') return stageWords.waiting;
  return progress > 0 && progress < 1 ? `${stageWords[stage]}, ${Math.floor(progress * 100)} %` : stageWords[stage];
}

/** Where in a file something went wrong; a person looks for it with a hex viewer or an editor. */
export function describePlace(at: NonNullable<MeasuringRun['error']>['at']): string | undefined {
  if (at?.line !== undefined) return `line ${formatCount(at.line)}`;
  if (at?.byte !== undefined) return `byte ${formatCount(at.byte)}`;
  return undefined;
}
