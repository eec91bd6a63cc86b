import type { UnitDoubt } from '@masswright/contracts';
import { formatCount } from '@masswright/units';
import { unitTexts } from '../../../lib/unit-texts';

const powers = [
  { value: 1e9, times: 'a thousand million', share: 'a thousand-millionth' },
  { value: 1e6, times: 'a million', share: 'a millionth' },
  { value: 1e3, times: 'a thousand', share: 'a thousandth' },
] as const;
/** So near to a power it is said by its name: the question is which unit, and not how large exactly. */
const nearPower = 0.1;

/** How a volume stands to the one before, in plain words and with two digits at most. */
export function describeRatio({ volumeRatio }: Pick<UnitDoubt, 'volumeRatio'>): string {
  const isMore = volumeRatio >= 1;
  const size = isMore ? volumeRatio : 1 / volumeRatio;
  const power = powers.find(({ value }) => Math.abs(size / value - 1) < nearPower);
  if (power) return isMore ? `about ${power.times} times` : `about ${power.share} of`;
  const rounded = Number(size.toPrecision(2));
  const count = rounded >= 1e6 ? `${formatCount(Math.round(rounded / 1e6))} million` : formatCount(Math.round(rounded));
  return isMore ? `about ${count} times` : `about 1/${formatCount(Math.round(rounded))} of`;
}

/** What a row asks: about one unit where the volumes speak for it, else which it is. */
export function askUnit(doubt: UnitDoubt): string {
  const { lengthUnit } = doubt;
  return `${describeRatio(doubt)} the volume before: ${lengthUnit === null ? 'in which unit is it?' : `${unitTexts[lengthUnit].plural}?`}`.replace(/^a/, 'A');
}
