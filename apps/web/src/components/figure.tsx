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

/** How much room a column's figures take, in digits: before their point, and behind it with the point. */
export interface FigureRoom {
  before: number;
  behind: number;
}

const writeTail = ({ fraction, exponent }: FigureParts): string => `${fraction ? `.${fraction}` : ''}${exponent}`;

/**
 * A figure of a column whose figures stand under one another at their decimal points, each written plainly up to nine digits. `behind` is the
 * room that the column keeps behind its integers, the point with it.
 */
export function AlignedFigure({ value, digits, behind }: { value: number; digits: number; behind: number }) {
  if (!Number.isFinite(value)) return <span className="figure figure-aligned">—</span>;
  const parts = splitFigure(value, { digits });
  return (
    <span className="figure figure-aligned">
      {parts.sign}
      {parts.integer}
      {behind > 0 && (
        <span className="figure-tail" style={{ width: `${behind}ch` }}>
          <PowerText text={writeTail(parts)} />
        </span>
      )}
    </span>
  );
}

/** The room that all of a column's figures fit into. */
export function computeFigureRoom(values: readonly number[], digits: number): FigureRoom {
  const all = values.filter(Number.isFinite).map((value) => splitFigure(value, { digits }));
  return {
    before: Math.max(0, ...all.map(({ sign, integer }) => sign.length + integer.length)),
    behind: Math.max(0, ...all.map((parts) => writeTail(parts).length)),
  };
}

/** The room that suits several groups of figures. */
export function joinFigureRooms(rooms: readonly FigureRoom[]): FigureRoom {
  return { before: Math.max(0, ...rooms.map(({ before }) => before)), behind: Math.max(0, ...rooms.map(({ behind }) => behind)) };
}
