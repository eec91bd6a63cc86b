import { formatFigure, splitFigure, type FigureParts } from '@masswright/units';

const raised = '⁰¹²³⁴⁵⁶⁷⁸⁹';

/** The face of the figures has no raised digits beyond ³: a power of ten is set with ordinary ones, and copied as 10^-6. */
export function PowerText({ text }: { text: string }) {
  const [plain = '', power] = text.split('×10');
  if (power === undefined) return text;
  return (
    <>
      {plain}×10
      <sup className="figure-power">
        <span className="figure-power-mark">^</span>
        {power.replace('⁻', '-').replace(/[⁰¹²³⁴-⁹]/g, (digit) => String(raised.indexOf(digit)))}
      </sup>
    </>
  );
}

/** A figure with its unit: the unit is softer than the figure and never capitals. */
export function Figure({ value, unit, digits = 6, big = false }: { value: number; unit?: string; digits?: number; big?: boolean }) {
  return (
    <span className={`figure${big ? ' figure-big' : ''}`}>
      {Number.isFinite(value) ? <PowerText text={formatFigure(value, { digits })} /> : '—'}
      {unit && <span className="unit"> {unit}</span>}
    </span>
  );
}

/** From here on a column would show more digits than its others have, and grow wide with them. */
const columnPlainBelow = 1e5;

function splitColumnFigure(value: number, digits: number): FigureParts {
  const [mantissa = '', power = '0'] = value.toExponential(digits - 1).split('e');
  if (Math.abs(Number(`${mantissa}e${power}`)) < columnPlainBelow) return splitFigure(value, { digits });
  const { sign, integer, fraction } = splitFigure(Number(mantissa), { digits });
  return { sign, integer, fraction, exponent: `×10${[...String(Number(power))].map((digit) => raised[Number(digit)]).join('')}` };
}

/**
 * A figure of a column whose figures stand under one another at their decimal points. `fractionDigits` is the longest fraction
 * of the column; shorter ones are followed by as much room.
 */
export function AlignedFigure({ value, digits, fractionDigits }: { value: number; digits: number; fractionDigits: number }) {
  if (!Number.isFinite(value)) return <span className="figure figure-aligned">—</span>;
  const { sign, integer, fraction, exponent } = splitColumnFigure(value, digits);
  // A figure has its point only with a fraction: without one, the point's own place is left free too.
  const room = fractionDigits === 0 ? 0 : fractionDigits + 1 - (fraction ? fraction.length + 1 : 0) - exponent.length;
  return (
    <span className="figure figure-aligned">
      <PowerText text={`${sign}${integer}${fraction ? `.${fraction}` : ''}${exponent}`} />
      {room > 0 && <span className="figure-room" style={{ width: `${room}ch` }} />}
    </span>
  );
}

/** The longest fraction among the figures of a column. */
export function computeFractionDigits(values: readonly number[], digits: number): number {
  return Math.max(0, ...values.filter(Number.isFinite).map((value) => splitColumnFigure(value, digits)).map(({ fraction, exponent }) => (exponent ? 0 : fraction.length)));
}
