import type { LengthUnit } from '@masswright/units';
import { describe, expect, it } from 'vitest';
import { describeDeclaredUnits, findCommonUnit } from './declared-units';
import type { UploadEntry } from './upload-entry';

const box = { format: '3mf', compression: null, facets: 12, boundingBox: { min: [0, 0, 0], max: [40, 30, 20] }, volume: 24_000, silhouette: null } as const;
const file = (declaredUnit: LengthUnit | null): Pick<UploadEntry, 'quick'> => ({ quick: { ...box, boundingBox: { min: [0, 0, 0], max: [40, 30, 20] }, declaredUnit } });
const unread: Pick<UploadEntry, 'quick'> = { quick: null };

describe('what files say of their units', () => {
  it.each([
    [[file('mm')], 'mm', 'The file says millimetres.'],
    [[file('inch'), file('inch')], 'inch', 'All of the files say inches.'],
    [[file(null)], undefined, 'The file does not say.'],
    [[unread], undefined, 'The file does not say.'],
    [[file(null), file(null)], undefined, 'The files do not say. One answer serves all of them, and any can differ.'],
    [[file('mm'), file('mm'), file('m')], undefined, '2 files say millimetres, 1 file says metres. They can be decided file by file.'],
    [[file('m'), unread], undefined, '1 file says metres; the others do not say. They can be decided file by file.'],
  ])('%#: %j', (files, common, sentence) => {
    expect(findCommonUnit(files)).toBe(common);
    expect(describeDeclaredUnits(files)).toBe(sentence);
  });
});
