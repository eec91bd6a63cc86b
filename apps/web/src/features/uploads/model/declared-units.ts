import { lengthUnits, type LengthUnit } from '@masswright/units';
import { countOf } from '../../../lib/plural';
import { unitTexts } from '../../../lib/unit-texts';
import { isRead } from './quick-figures';
import type { UploadEntry } from './upload-entry';

type ReadEntry = Pick<UploadEntry, 'quick'>;

const findUnit = ({ quick }: ReadEntry): LengthUnit | null => (isRead(quick) ? quick.declaredUnit : null);

/** The unit that every one of the files says it is in; undefined where one says none, another, or was not read. */
export function findCommonUnit(entries: readonly ReadEntry[]): LengthUnit | undefined {
  const [first = null, ...others] = entries.map(findUnit);
  return first !== null && others.every((unit) => unit === first) ? first : undefined;
}

/** What the files say of their units, in a sentence. */
export function describeDeclaredUnits(entries: readonly ReadEntry[]): string {
  const single = entries.length === 1;
  const common = findCommonUnit(entries);
  if (common !== undefined) return single ? `The file says ${unitTexts[common].plural}.` : `All of the files say ${unitTexts[common].plural}.`;
  const said = entries.map(findUnit);
  const counts = lengthUnits.map((unit) => ({ unit, count: said.filter((one) => one === unit).length })).filter(({ count }) => count > 0);
  if (counts.length === 0) return single ? 'The file does not say.' : 'The files do not say. One answer serves all of them, and any can differ.';
  const sayings = counts.map(({ unit, count }) => `${countOf(count, 'file')} ${count === 1 ? 'says' : 'say'} ${unitTexts[unit].plural}`).join(', ');
  return `${sayings}${said.includes(null) ? '; the others do not say' : ''}. They can be decided file by file.`;
}
