import type { Axis, FailedRecord, Setting, StatementRecord, Vector3 } from '@masswright/contracts';
import { MeshError } from '@masswright/geometry';
import { computeStatement } from '@masswright/mechanics';
import { convertToMetres, type LengthUnit } from '@masswright/units';
import type { AskedAxis, Command } from './command-line';
import type { MeasuredFile } from './measure-file';

/** What a file that the system won't let be read gives. */
export interface UnreadableRecord {
  file: string;
  error: { code: 'not-readable'; message: string; at: null };
}

export type FileRecord = StatementRecord | FailedRecord | UnreadableRecord;

export const isFailed = (record: FileRecord): record is FailedRecord | UnreadableRecord => 'error' in record;

/** The record of a file that was measured; why there is none where nobody says its unit. */
export function makeRecord(file: string, { sha256, measurement }: MeasuredFile, command: Command): FileRecord {
  const lengthUnit = command.lengthUnit ?? measurement.declaredUnit;
  const record = lengthUnit === null ? undefined : computeStatement(measurement, makeSetting(command, lengthUnit), { file, sha256 });
  return record ?? { file, error: { code: 'unit-not-stated', message: 'The file does not state its unit. Say what one unit of it is by --unit.', at: null } };
}

/** What stands in the record's place for a file that could not be measured. */
export function describeFailure(file: string, error: unknown): FailedRecord | UnreadableRecord {
  if (error instanceof MeshError) return { file, error: { code: error.code, message: error.message, at: error.at } };
  if (error instanceof Error && 'syscall' in error) return { file, error: { code: 'not-readable', message: `The file can’t be read (${error.message}).`, at: null } };
  throw error;
}

function makeSetting({ densityKgM3, axis }: Command, lengthUnit: LengthUnit): Setting {
  return { lengthUnit, densityKgM3, densitySpreadKgM3: null, material: null, weighing: null, axis: convertAxis(axis, lengthUnit), drive: null };
}

function convertAxis(axis: AskedAxis, lengthUnit: LengthUnit): Axis {
  if (axis.kind !== 'typed') return axis;
  const pointM = axis.point.map((coordinate) => convertToMetres(coordinate, lengthUnit)) as Vector3;
  return { kind: 'typed', pointM, direction: axis.direction };
}

