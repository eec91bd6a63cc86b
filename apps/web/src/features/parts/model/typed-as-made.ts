import type { AsMade } from '@masswright/contracts';
import { parseQuantity } from '@masswright/units';
import type { ReadField } from '../../../components/typed-field';
import { readNumber } from '../../../lib/typed-number';

const plain = (value: number): string => String(Number(value.toPrecision(6)));

function readShare(text: string): ReadField<AsMade> {
  const { value, error } = readNumber(text);
  if (error !== undefined) return { error };
  if (value < 0) return { error: 'What stands behind the ± is not negative.' };
  return value > 50 ? { error: 'A spread of scale is at most 50 %.' } : { value: { kind: 'scale', spread: value / 100 } };
}

/** How far the part as made may differ from the part as drawn: `± 0.3 %` of all lengths, or `± 0.1 mm` along the surface's normal. */
export function readAsMade(text: string): ReadField<AsMade> {
  const typed = text.trim().replace(/^(±|\+\/?-)\s*/, '');
  if (typed === '') return text.trim() === '' ? { value: null } : { error: 'Write how far it may be off behind the ±, as in ± 0.1 mm.' };
  if (typed.endsWith('%')) return readShare(typed.slice(0, -1));
  if (/^[-+]?[\d.]+(e[-+]?\d+)?$/i.test(typed)) return { error: 'Write % behind it for a spread of scale, or a unit of length for an offset of the surface.' };
  const parsed = parseQuantity(typed, 'length');
  if ('error' in parsed) return { error: parsed.error };
  if (parsed.value < 0) return { error: 'What stands behind the ± is not negative.' };
  return parsed.value > 1 ? { error: 'An offset is at most a metre.' } : { value: { kind: 'offset', spreadM: parsed.value } };
}

export function writeAsMade(asMade: AsMade | null): string {
  if (asMade === null) return '';
  return asMade.kind === 'scale' ? `± ${plain(asMade.spread * 100)} %` : `± ${plain(asMade.spreadM * 1000)} mm`;
}

/** What that means for a part. */
export function describeAsMade(asMade: AsMade): string {
  return asMade.kind === 'scale'
    ? `all lengths up to ${plain(asMade.spread * 100)} % longer or shorter, as by shrinkage`
    : `the surface up to ${plain(asMade.spreadM * 1000)} mm further out or in, as by machining, a coating or the layers of a print`;
}
