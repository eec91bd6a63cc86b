import { formatFigure, splitFigure } from '@masswright/units';

/** A figure with its unit: the unit is softer than the figure and never capitals. */
export function Figure({ value, unit, digits = 6, big = false }: { value: number; unit?: string; digits?: number; big?: boolean }) {
  return (
    <span className={`figure${big ? ' figure-big' : ''}`}>
      {Number.isFinite(value) ? formatFigure(value, { digits }) : '—'}
      {unit && <span className="unit"> {unit}</span>}
    </span>
  );
}

/**
 * A figure of a column whose figures stand under one another at their decimal points. `fractionDigits` is the longest fraction
 * of the column; shorter ones are followed by as much room.
 */
export function AlignedFigure({ value, digits, fractionDigits }: { value: number; digits: number; fractionDigits: number }) {
  if (!Number.isFinite(value)) return <span className="figure figure-aligned">—</span>;
  const { sign, integer, fraction, exponent } = splitFigure(value, { digits });
  // A figure has its point only with a fraction: without one, the point's own place is left free too.
  const room = fractionDigits === 0 ? 0 : fractionDigits + 1 - (fraction ? fraction.length + 1 : 0) - exponent.length;
  return (
    <span className="figure figure-aligned">
      {`${sign}${integer}${fraction ? `.${fraction}` : ''}${exponent}`}
      {room > 0 && <span className="figure-room" style={{ width: `${room}ch` }} />}
    </span>
  );
}

/** The longest fraction among the figures of a column. */
export function computeFractionDigits(values: readonly number[], digits: number): number {
  return Math.max(0, ...values.filter(Number.isFinite).map((value) => splitFigure(value, { digits })).map(({ fraction, exponent }) => (exponent ? 0 : fraction.length)));
}
