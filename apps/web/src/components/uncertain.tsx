import { writeFigure } from '@masswright/units';
import { writeUncertain, type UncertainOptions } from '../lib/uncertain-figure';
import { PowerText } from './figure';

interface UncertainProps extends UncertainOptions {
  value: number;
  /** Expanded, k = 2, in the unit of the value; null where there is none. */
  uncertainty: number | null;
  unit: string;
}

/** All digits, for who wants them. */
const sayAll = (value: number, unit: string): string => `${writeFigure(value)} ${unit}`;

/** A figure rounded by its uncertainty, with that behind it. */
export function Uncertain({ value, uncertainty, unit, ...options }: UncertainProps) {
  const { value: text, spread, power } = writeUncertain(value, uncertainty, options);
  return (
    <span className="figure uncertain" title={sayAll(value, unit)}>
      {power !== '' && spread !== null && '('}
      {spread === null ? <PowerText text={text} /> : text}
      {spread !== null && <span className="figure-spread"> ± {spread}</span>}
      {power !== '' && spread !== null && ')'}
      {power !== '' && <PowerText text={power} />}
      <span className="unit"> {unit}</span>
    </span>
  );
}

/** The same at the head of a page: the figure large, its ± under it. */
export function BigUncertain({ value, uncertainty, unit, ...options }: UncertainProps) {
  const { value: text, spread, power } = writeUncertain(value, uncertainty, options);
  return (
    <>
      <span className="figure figure-big" title={sayAll(value, unit)}>
        {spread === null ? <PowerText text={text} /> : text}
        {power !== '' && <PowerText text={power} />}
        <span className="unit"> {unit}</span>
      </span>
      {spread !== null && (
        <span className="figure figure-spread figure-spread-below">
          ± {spread}
          {power !== '' && <PowerText text={power} />}
          <span className="unit"> {unit}</span>
        </span>
      )}
    </>
  );
}

/** How many digits stand behind the points of some texts, the point with them. */
export function computeTailRoom(texts: readonly string[]): number {
  return Math.max(0, ...texts.map((text) => text.length - (text.includes('.') ? text.indexOf('.') : text.length)));
}

/** A text of a column whose points stand under one another. */
export function AlignedText({ text, behind }: { text: string; behind: number }) {
  const point = text.includes('.') ? text.indexOf('.') : text.length;
  return (
    <span className="figure-aligned">
      {text.slice(0, point)}
      {behind > 0 && (
        <span className="figure-tail" style={{ width: `${behind}ch` }}>
          {text.slice(point)}
        </span>
      )}
    </span>
  );
}
