import type { Drive } from '@masswright/contracts';
import { fromSi, getUnit, parseQuantity, unitTable } from '@masswright/units';
import { writeNumber } from '../../../lib/typed-number';

const speedUnit = getUnit(unitTable.angularSpeed, 'r/min');

/** What a person types: a speed, in r/min where no unit is written, and a time, in seconds. */
export interface DriveTexts {
  speed: string;
  time: string;
}

export type ReadDrive = { drive: Drive | null; speedError?: undefined; timeError?: undefined } | { drive?: undefined; speedError?: string; timeError?: string };

export function readDrive({ speed, time }: DriveTexts): ReadDrive {
  if (speed.trim() === '' && time.trim() === '') return { drive: null };
  const speedRead = parseQuantity(speed, 'angularSpeed', { bareUnit: 'r/min' });
  const timeRead = parseQuantity(time, 'time', { bareUnit: 's' });
  const speedError = 'error' in speedRead ? speedRead.error : Math.abs(speedRead.value) > 1e6 ? 'This is faster than anything turns.' : undefined;
  const timeError = 'error' in timeRead ? timeRead.error : !(timeRead.value > 0) ? 'A time is greater than 0.' : timeRead.value < 1e-6 ? 'A time is at least a microsecond.' : timeRead.value > 1e9 ? 'This is longer than anything runs up.' : undefined;
  if (speedError !== undefined || timeError !== undefined || 'error' in speedRead || 'error' in timeRead) return { speedError, timeError };
  return { drive: { speedRadPerS: speedRead.value, timeS: timeRead.value } };
}

export function writeDrive(drive: Drive | null): DriveTexts {
  if (!drive) return { speed: '', time: '' };
  return { speed: writeNumber(fromSi(drive.speedRadPerS, speedUnit)), time: writeNumber(drive.timeS) };
}
