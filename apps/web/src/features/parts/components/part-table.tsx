import type { PartRow } from '@masswright/contracts';
import { formatFigure, getLengthUnit } from '@masswright/units';
import { Fragment } from 'react';
import { Link } from 'react-router-dom';
import { AlignedFigure } from '../../../components/figure';
import { StatusTag } from '../../../components/status-tag';
import { computeColumnFractions, computeRowFigures, listDigits, listUnits, type ColumnFractions, type RowFigures } from '../model/row-figures';
import { describeRun } from '../model/run-words';
import { describeVerdict } from '../model/soundness-words';
import './part-table.css';

/** Longer names are cut after two lines of it. */
const nameLetters = 60;

/** What a mesh gives no figures for, in the place where they would stand. */
function findReason(row: PartRow): string | undefined {
  const { run, setting } = row.revision;
  if (run.state === 'failed') return run.error?.message ?? 'The file could not be measured.';
  if (run.state !== 'done') return '';
  if (setting.lengthUnit === null) return 'State the unit: without it there is no size and no mass.';
  return undefined;
}

function FigureCells({ row, figures, fractions }: { row: PartRow; figures: RowFigures; fractions: ColumnFractions }) {
  const reason = findReason(row);
  if (reason !== undefined) {
    return (
      <td colSpan={5} className="part-reason">
        {reason}
      </td>
    );
  }
  const { size, mass, moments } = figures;
  return (
    <>
      <td className="numeric figure part-size">
        {size
          ? size.map((extent, index) => (
              <Fragment key={index}>
                {index > 0 && ' × '}
                <span className="part-extent">{formatFigure(extent, { digits: listDigits })}</span>
              </Fragment>
            ))
          : '–'}
      </td>
      {mass === null || !moments ? (
        <td colSpan={4} className="part-reason">
          {row.soundness?.defensible ? 'State the density: without it there is no mass.' : 'No figures: the mesh has no inside that could be defended.'}
        </td>
      ) : (
        <>
          <td className="numeric">
            <AlignedFigure value={mass} digits={listDigits} fractionDigits={fractions.mass} />
          </td>
          {moments.map((moment, index) => (
            <td key={index} className="numeric">
              <AlignedFigure value={moment} digits={listDigits} fractionDigits={fractions.moments[index] ?? 0} />
            </td>
          ))}
        </>
      )}
    </>
  );
}

function SoundnessCell({ row }: { row: PartRow }) {
  const { run } = row.revision;
  if (run.state === 'failed') return <StatusTag tone="wrong">{describeRun(run)}</StatusTag>;
  if (row.soundness === null || run.state !== 'done') {
    return (
      <span className="part-run">
        <StatusTag tone="busy" plain>
          {describeRun(run)}
        </StatusTag>
        <progress className="part-run-progress" max={1} value={run.progress} aria-label={`${row.name}: ${describeRun(run)}`} />
      </span>
    );
  }
  const { tone, word } = describeVerdict(row.soundness);
  return <StatusTag tone={tone}>{word}</StatusTag>;
}

export function PartTable({ rows }: { rows: readonly PartRow[] }) {
  const figures = rows.map(computeRowFigures);
  const fractions = computeColumnFractions(figures);
  const { length, mass, inertia } = listUnits;
  return (
    <div className="table-frame part-table-frame" role="region" aria-label="Parts" tabIndex={0}>
      <table className="table part-table">
        <caption className="hidden-visually">
          Parts with mass in {mass.symbol} and principal moments in {inertia.symbol} about each centre of mass
        </caption>
        <thead>
          <tr>
            <th scope="col" className="numeric">
              No.
            </th>
            <th scope="col">Part</th>
            <th scope="col">Mesh</th>
            <th scope="col">Rev</th>
            <th scope="col">Unit</th>
            <th scope="col" className="numeric">
              Size <span className="unit">{length.symbol}</span>
            </th>
            <th scope="col" className="numeric">
              Mass <span className="unit">{mass.symbol}</span>
            </th>
            {[1, 2, 3].map((index) => (
              <th key={index} scope="col" className="numeric">
                <span className="unit">
                  <b className="part-moment">I<sub>{index}</sub></b> {inertia.symbol}
                </span>
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row, index) => (
            <tr key={row.id}>
              <td className="numeric figure soft">{row.number}</td>
              <th scope="row">
                <Link to={`/projects/${row.projectId}/parts/${row.id}`} title={row.name.length > nameLetters ? row.name : undefined}>
                  {row.name}
                </Link>
              </th>
              <td>
                <SoundnessCell row={row} />
              </td>
              <td className="figure">{row.revision.letter}</td>
              <td>
                {row.revision.setting.lengthUnit ? (
                  <span className="figure">{getLengthUnit(row.revision.setting.lengthUnit).symbol}</span>
                ) : (
                  <span className="soft">not stated</span>
                )}
              </td>
              <FigureCells row={row} figures={figures[index] ?? computeRowFigures(row)} fractions={fractions} />
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
