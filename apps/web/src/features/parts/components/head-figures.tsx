import type { StatementRecord } from '@masswright/contracts';
import { fromSi, type Quantity } from '@masswright/units';
import { BigUncertain } from '../../../components/uncertain';
import { formatDecimals } from '../../../lib/fixed-figure';
import { countDecimals, writeUncertain } from '../../../lib/uncertain-figure';
import { chooseDisplayUnit } from '../model/display-units';

interface HeadFigureProps {
  name: string;
  quantity: Quantity;
  value: number;
  uncertainty: number | null | undefined;
  correction: number | null | undefined;
  /** The facets are being examined: a correction may come. */
  isAwaited: boolean;
}

/** A correction that moves no digit that is shown needs no words. */
export function writeCorrection(value: number, uncertainty: number | null, correction: number): string | undefined {
  const decimals = uncertainty === null ? 0 : countDecimals(value, uncertainty);
  if (uncertainty === null || Math.abs(correction) < 0.5 * 10 ** -decimals) return undefined;
  const { power } = writeUncertain(value, uncertainty);
  const text = power === '' ? formatDecimals(correction, Math.max(0, decimals)) : correction.toExponential(1);
  return correction > 0 ? `+${text}` : text;
}

function HeadFigure({ name, quantity, value, uncertainty, correction, isAwaited }: HeadFigureProps) {
  const unit = chooseDisplayUnit(quantity, value);
  const spread = uncertainty === null || uncertainty === undefined ? null : fromSi(uncertainty, unit);
  const more = correction ? writeCorrection(fromSi(value, unit), spread, fromSi(correction, unit)) : undefined;
  return (
    <div className="head-figure">
      <dt className="caption">{name}</dt>
      <dd>
        <BigUncertain value={fromSi(value, unit)} uncertainty={spread} unit={unit.symbol} />
        {isAwaited && <span className="head-correction soft">smooth body …</span>}
        {more && (
          <span className="head-correction soft" title="What the curved surfaces behind the facets are predicted to add; no part of the figure.">
            smooth body <span className="figure">{more}</span>
            <span className="unit"> {unit.symbol}</span>
          </span>
        )}
      </dd>
    </div>
  );
}

/** Mass, volume and surface, each with what is in doubt about it. */
export function HeadFigures({ statement, isExamining }: { statement: StatementRecord; isExamining: boolean }) {
  const { massKg, volumeM3, areaM2, uncertainty, correction } = statement;
  return (
    <dl className="head-figures">
      {massKg !== null && <HeadFigure name="Mass" quantity="mass" value={massKg} uncertainty={uncertainty?.massKg} correction={correction?.massKg} isAwaited={isExamining} />}
      {volumeM3 !== null && <HeadFigure name="Volume" quantity="volume" value={volumeM3} uncertainty={uncertainty?.volumeM3} correction={correction?.volumeM3} isAwaited={isExamining} />}
      <HeadFigure name="Surface" quantity="area" value={areaM2} uncertainty={uncertainty?.areaM2} correction={correction?.areaM2} isAwaited={isExamining} />
    </dl>
  );
}
