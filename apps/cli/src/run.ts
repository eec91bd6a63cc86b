import type { Command } from './command-line';
import { findFiles } from './find-files';
import { describeFailure, isFailed, makeRecord, type FileRecord } from './make-record';
import { measureFile } from './measure-file';
import type { Progress } from './progress';
import { csvHeader, writeCsvRow } from './write-csv';
import { writeTable } from './write-table';

/**
 * Measures all files, one after another, and writes what was found as soon as it is (a table at the end).
 * @returns the exit code: 0, or 2 where a file could not be measured
 */
export async function run(command: Command, write: (text: string) => void, progress: Progress): Promise<0 | 2> {
  const files = await findFiles(command.paths);
  const records: FileRecord[] = [];
  if (command.format === 'csv') write(csvHeader);
  for (const [index, file] of files.entries()) {
    const record = await measureOne(file, command, (share) => progress.show(`${index + 1}/${files.length} ${file}`, share));
    records.push(record);
    progress.clear();
    if (command.format === 'json') write(`${JSON.stringify(record)}\n`);
    if (command.format === 'csv') write(writeCsvRow(record));
  }
  if (command.format === 'table') write(writeTable(records));
  return records.some(isFailed) ? 2 : 0;
}

async function measureOne(file: string, command: Command, onProgress: (share: number) => void): Promise<FileRecord> {
  try {
    return makeRecord(file, await measureFile(file, command.quick, onProgress), command);
  } catch (error) {
    return describeFailure(file, error);
  }
}
