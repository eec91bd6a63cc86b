import { HTMLSelect } from '@blueprintjs/core';
import type { Measurement, Setting, StatementRecord } from '@masswright/contracts';
import { formatFigure, fromSi, type Unit } from '@masswright/units';
import { useState } from 'react';
import { PowerText } from '../../../components/figure';
import { Uncertain } from '../../../components/uncertain';
import { doubtfulFigures, listDoubt, listUncounted, type DoubtfulFigure, type LedgerLine } from '../model/doubt-ledger';
import { chooseDisplayUnit } from '../model/display-units';
import { Fact, Section, sectionNames } from './section';

const percent = (share: number): string => (share < 0.0005 ? '<0.1' : (100 * share).toFixed(1));

function Line({ line, unit }: { line: LedgerLine; unit: Unit }) {
  const { name, what, remedy, share, alone } = line;
  return (
    <tr>
      <th scope="row">{name}</th>
      <td className="ledger-share">
        <span className="ledger-bar" aria-hidden="true">
          <span style={{ width: `${100 * (share ?? 0)}%` }} />
        </span>
      </td>
      <td className="figure numeric">{share === null ? <span className="soft">not told</span> : `${percent(share)} %`}</td>
      <td className="figure numeric">{alone === null ? '–' : <PowerText text={`± ${formatFigure(fromSi(alone, unit), { digits: 2 })}`} />}</td>
      <td className="ledger-words">
        {what}. <span className="soft">{remedy}</span>
      </td>
    </tr>
  );
}

function Ledger({ statement, figure, unit }: { statement: StatementRecord; figure: DoubtfulFigure; unit: Unit }) {
  const lines = listDoubt(statement, figure);
  if (lines.length === 0) return <p className="soft">Nothing is known to make this figure doubtful.</p>;
  return (
    <div className="ledger" role="group" aria-label="Doubt ledger" tabIndex={0}>
      <table className="small-table">
        <thead>
          <tr>
            <th scope="col">From</th>
            <th scope="col" colSpan={2}>
              Share
            </th>
            <th scope="col" className="numeric">
              Alone <span className="unit">{unit.symbol}</span>
            </th>
            <th scope="col">What it is, and what would make it smaller</th>
          </tr>
        </thead>
        <tbody>
          {lines.map((line) => (
            <Line key={line.term} line={line} unit={unit} />
          ))}
        </tbody>
      </table>
    </div>
  );
}

/** What the smooth body behind the facets has more, in the unit of the figure. */
function Correction({ correction, unit }: { correction: number; unit: Unit }) {
  return (
    <Fact name="Smooth body">
      <span className="figure">
        {correction > 0 && '+'}
        <PowerText text={formatFigure(fromSi(correction, unit), { digits: 2 })} />
        <span className="unit"> {unit.symbol}</span>
      </span>{' '}
      <span className="soft">
        is what the curved surfaces behind the facets are predicted to add. It is no part of the figure: what is meant lies from the figure {correction < 0 ? 'with it, less the ±, to the figure plus the ±' : 'less the ± to the figure with it, plus the ±'}.
      </span>
    </Fact>
  );
}

const selectId = 'doubt-figure';

interface DoubtSectionProps {
  statement: StatementRecord;
  setting: Setting;
  measurement: Measurement;
}

/** The doubt ledger: what the ± of a figure is made of, and what is not in it. */
export function DoubtSection({ statement, setting, measurement }: DoubtSectionProps) {
  const [chosen, setChosen] = useState('mass');
  const offered = doubtfulFigures.filter(({ read }) => read(statement) !== null);
  const figure = offered.find((one) => one.id === chosen) ?? offered[0];
  const { uncertainty, correction } = statement;
  if (!figure || !uncertainty) return null;
  const value = figure.read(statement) ?? 0;
  const unit = chooseDisplayUnit(figure.quantity, value);
  const spread = figure.read(uncertainty);
  const corrected = correction && figure.read(correction);
  const uncounted = listUncounted(statement, setting, measurement);
  return (
    <Section name={sectionNames.doubt} aside="± is the expanded uncertainty, k = 2: about 95 of 100 such intervals hold what is meant">
      <dl className="facts">
        <Fact name="Figure">
          <span className="doubt-figure">
            <label className="hidden-visually" htmlFor={selectId}>
              Doubt of
            </label>
            <HTMLSelect id={selectId} value={figure.id} options={offered.map((one) => ({ value: one.id, label: one.name }))} onChange={(event) => setChosen(event.currentTarget.value)} />
            <Uncertain value={fromSi(value, unit)} uncertainty={spread === null ? null : fromSi(spread, unit)} unit={unit.symbol} />
          </span>
        </Fact>
        {corrected !== null && corrected !== 0 && <Correction correction={corrected} unit={unit} />}
      </dl>
      <Ledger statement={statement} figure={figure} unit={unit} />
      {uncounted.length > 0 && (
        <dl className="facts">
          <Fact name="Not counted">
            <ul className="findings">
              {uncounted.map((sentence) => (
                <li key={sentence}>{sentence}</li>
              ))}
            </ul>
          </Fact>
        </dl>
      )}
    </Section>
  );
}
