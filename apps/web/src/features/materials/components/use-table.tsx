import type { MaterialUse } from '@masswright/contracts';
import { fromSi, getUnit, unitTable } from '@masswright/units';
import { Link } from 'react-router-dom';
import { AlignedFigure, computeFigureRoom } from '../../../components/figure';
import { writePlain } from '../../../lib/material-words';
import { computeMove } from '../model/use-figures';
import './materials.css';

const gram = getUnit(unitTable.mass, 'g');
const digits = 4;
const shareDigits = 2;

interface UseTableProps {
  uses: readonly MaterialUse[];
  chosen: ReadonlySet<string>;
  canChoose: boolean;
  onChoose: (chosen: ReadonlySet<string>) => void;
}

function Mass({ valueKg, fraction }: { valueKg: number | null; fraction: number }) {
  return valueKg === null ? <span className="soft">–</span> : <AlignedFigure value={fromSi(valueKg, gram)} digits={digits} behind={fraction} />;
}

/** By how much something moves, with its sign; nothing where it doesn't. The sign and the figure are one text: nothing comes between them. */
function Move({ value, figureDigits, fraction }: { value: number | undefined; figureDigits: number; fraction: number }) {
  if (value === undefined || value === 0) return <span className="soft">–</span>;
  return (
    <span className="use-move">
      {value > 0 && <span className="figure">+</span>}
      <AlignedFigure value={value} digits={figureDigits} behind={fraction} />
    </span>
  );
}

/** The parts that are set to a material: with which density, and what the present one would make of them. */
export function UseTable({ uses, chosen, canChoose, onChoose }: UseTableProps) {
  const moves = uses.map(computeMove);
  const inGrams = (values: readonly (number | null | undefined)[]): number =>
    computeFigureRoom(
      values.filter((value) => value !== null && value !== undefined).map((value) => fromSi(value, gram)),
      digits,
    ).behind;
  const massFraction = inGrams(uses.flatMap(({ massKg, massAtPresentDensityKg }) => [massKg, massAtPresentDensityKg]));
  const moveFraction = inGrams(moves.map((move) => move?.differenceKg));
  const shares = moves.flatMap((move) => (move === null || move.share === 0 ? [] : [move.share * 100]));
  const shareFraction = computeFigureRoom(shares, shareDigits).behind;
  const toggle = (id: string): void => {
    const next = new Set(chosen);
    if (!next.delete(id)) next.add(id);
    onChoose(next);
  };
  const isAll = uses.length > 0 && uses.every(({ partId }) => chosen.has(partId));
  return (
    <div className="table-frame" role="region" aria-label="Parts of this material" tabIndex={0}>
      <table className="table use-table">
        <thead>
          <tr>
            {canChoose && (
              <th scope="col" className="screen-only">
                <input type="checkbox" aria-label="Choose all parts" checked={isAll} onChange={() => onChoose(new Set(isAll ? [] : uses.map(({ partId }) => partId)))} />
              </th>
            )}
            <th scope="col">Part</th>
            <th scope="col">Project</th>
            <th scope="col">Rev</th>
            <th scope="col" className="numeric">
              Made with <span className="unit">kg/m³</span>
            </th>
            <th scope="col" className="numeric">
              Mass <span className="unit">g</span>
            </th>
            <th scope="col" className="numeric">
              With the present density <span className="unit">g</span>
            </th>
            <th scope="col" className="numeric">
              Moves <span className="unit">g</span>
            </th>
            <th scope="col" className="numeric">
              <span className="unit">%</span>
            </th>
          </tr>
        </thead>
        <tbody>
          {uses.map((use, index) => {
            const move = moves[index];
            return (
              <tr key={use.partId}>
                {canChoose && (
                  <td className="screen-only">
                    <input type="checkbox" aria-label={`Choose ${use.name}`} checked={chosen.has(use.partId)} onChange={() => toggle(use.partId)} />
                  </td>
                )}
                <th scope="row">
                  <Link to={`/projects/${use.projectId}/parts/${use.partId}`}>{use.name}</Link>
                </th>
                <td>
                  <Link to={`/projects/${use.projectId}`}>{use.projectName}</Link>
                </td>
                <td className="figure">{use.letter}</td>
                <td className="numeric figure">{writePlain(use.densityKgM3, 6)}</td>
                <td className="numeric">
                  <Mass valueKg={use.massKg} fraction={massFraction} />
                </td>
                <td className="numeric">{use.massKg !== null && use.massAtPresentDensityKg === null ? <span className="soft">its weight sets it</span> : <Mass valueKg={use.massAtPresentDensityKg} fraction={massFraction} />}</td>
                <td className="numeric"><Move value={move ? fromSi(move.differenceKg, gram) : undefined} figureDigits={digits} fraction={moveFraction} /></td>
                <td className="numeric">
                  <Move value={move ? move.share * 100 : undefined} figureDigits={shareDigits} fraction={shareFraction} />
                </td>
              </tr>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}
