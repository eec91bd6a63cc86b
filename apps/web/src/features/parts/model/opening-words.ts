import type { Openings } from '@masswright/contracts';
import { formatFigure, type LengthUnit } from '@masswright/units';
import { countOf } from '../../../lib/plural';
import { writeMeshContents } from './mesh-words';

export function describeOpenings({ loops, loopCount }: Openings): string {
  const listed = loops.length < loopCount ? ` The ${countOf(loops.length, 'longest', 'longest')} are listed.` : '';
  return `${countOf(loopCount, 'opening')}.${listed}`;
}

/** How far the volumes of an open mesh are apart: an indication of the doubt and no figure. Of hairlines: what may be lost at most. */
export function describeOpenVolume({ volumes, lostVolume }: Openings, unit: LengthUnit | null): string {
  const { aboutMiddle, fanned } = volumes;
  const larger = Math.max(Math.abs(aboutMiddle), Math.abs(fanned));
  const share = (part: number): string => (larger > 0 ? formatFigure((100 * part) / larger, { digits: 2 }) : '0');
  if (lostVolume !== null) {
    const { texts, symbol } = writeMeshContents([lostVolume], 3, unit);
    return `At most ${texts[0] ?? ''} ${symbol} may be lost in the gaps, ${share(lostVolume)} % of the volume; it is part of the uncertainty.`;
  }
  const { texts, symbol } = writeMeshContents([aboutMiddle, fanned], 3, unit);
  return `About the middle of its box the surface would hold ${texts[0] ?? ''}, with each opening closed by a fan to its centre ${texts[1] ?? ''} ${symbol}: ${share(Math.abs(aboutMiddle - fanned))} % apart. That tells how much hangs on the openings; neither is a figure of the part.`;
}
