import type { MeasuringRun } from '@masswright/contracts';
import { awaitsDecision, type UploadEntry } from './upload-entry';

const stageWords: Record<MeasuringRun['stage'], string> = {
  waiting: 'Waiting to be measured',
  hashing: 'Comparing with known files',
  reading: 'Reading the file',
  measuring: 'Measuring',
  examining: 'Measured, being examined',
  storing: 'Storing the figures',
};

/** Where an entry is, in words. */
export function describeEntry(entry: UploadEntry): string {
  if (entry.paused) return 'Paused';
  switch (entry.phase) {
    case 'waiting':
      return 'Waiting';
    case 'sending':
      return entry.sentBytes >= entry.sizeBytes && entry.sizeBytes > 0 ? 'Sent, being checked' : 'Sending';
    case 'sent':
      return awaitsDecision(entry) ? 'Sent, wants your decision' : 'Sent, being stored';
    case 'storing':
      return 'Sent, being stored';
    case 'present':
      return `There already, as No. ${entry.presentIn?.number ?? ''}`;
    case 'failed':
      return 'Not sent';
    case 'cancelled':
      return 'Cancelled';
    case 'stored':
      if (entry.part?.run.state === 'done') return entry.part.isDefensible === false ? 'Measured: no inside' : entry.part.sameBytes.length > 0 ? 'Measured before' : 'Measured';
      if (entry.part?.run.state === 'failed') return 'Could not be measured';
      return stageWords[entry.part?.run.stage ?? 'waiting'];
  }
}

/** Where the same bytes are already; undefined where nowhere. */
export function describeSameBytes({ part, projectId }: UploadEntry): string | undefined {
  const [first, ...others] = part?.sameBytes ?? [];
  if (!first) return undefined;
  const place = first.projectId === projectId ? '' : ` in ${first.projectName}`;
  return `The same bytes as No. ${first.number} ${first.name}, revision ${first.letter}${place}${others.length > 0 ? ` and ${others.length} more` : ''}: they were not measured again.`;
}

/** How far an entry is on its whole way, from 0 to 1; half of the way is sending, half measuring. */
export function computeShareDone(entry: UploadEntry): number {
  if (entry.phase === 'stored') return entry.part?.run.state === 'done' ? 1 : 0.5 + (entry.part?.run.progress ?? 0) / 2;
  return entry.sizeBytes > 0 ? (entry.sentBytes / entry.sizeBytes) * 0.5 : 0;
}
