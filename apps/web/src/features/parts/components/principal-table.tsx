import type { StatementRecord, Vector3 } from '@masswright/contracts';
import { fromSi, writeFigure, type Unit } from '@masswright/units';
import { PowerText } from '../../../components/figure';
import { AlignedText, computeTailRoom } from '../../../components/uncertain';
import { formatDecimals } from '../../../lib/fixed-figure';
import { writeUncertain, type UncertainText } from '../../../lib/uncertain-figure';
import { describeAxes, isAxisUnique } from '../model/axes-words';
import { chooseDisplayUnit } from '../model/display-units';

const directionDecimals = 5;

type Principal = { moments: Vector3; axes: [Vector3, Vector3, Vector3]; kind: NonNullable<StatementRecord['axes']>; radii: Vector3 };

export function findPrincipal({ principalMomentsKgM2, principalAxes, axes, radiiOfGyrationM }: StatementRecord): Principal | undefined {
  if (!principalMomentsKgM2 || !principalAxes || !axes || !radiiOfGyrationM) return undefined;
  return { moments: principalMomentsKgM2, axes: principalAxes, kind: axes, radii: radiiOfGyrationM };
}

/** A column of figures with their ±, one below the other. */
interface Column {
  texts: readonly UncertainText[];
  all: readonly string[];
  /** Room behind the points. */
  behind: number;
  isUncertain: boolean;
}

function writeColumn(values: Vector3, uncertainties: Vector3 | null | undefined, unit: Unit): Column {
  const shown = values.map((value) => fromSi(value, unit));
  const texts = shown.map((value, k) => writeUncertain(value, uncertainties ? fromSi(uncertainties[k] ?? 0, unit) : null));
  return { texts, all: shown.map((value) => `${writeFigure(value)} ${unit.symbol}`), behind: computeTailRoom(texts.map(({ value }) => value)), isUncertain: Boolean(uncertainties) };
}

/** Two cells: the figure, and its ± beside it. */
function ColumnCells({ column, index, isMain = false }: { column: Column; index: number; isMain?: boolean }) {
  const { value, spread, power } = column.texts[index] ?? { value: '—', spread: null, power: '' };
  const isPlain = !value.includes('×');
  return (
    <>
      <td className={`figure${isMain ? ' figure-main' : ''}`} title={column.all[index]}>
        {isPlain ? <AlignedText text={value} behind={column.behind} /> : <PowerText text={value} />}
        {spread === null && <PowerText text={power} />}
      </td>
      {column.isUncertain && (
        <td className="figure figure-spread principal-spread">
          ± <AlignedText text={spread ?? ''} behind={column.behind} />
          <PowerText text={power} />
        </td>
      )}
    </>
  );
}

interface PrincipalTableProps {
  principal: Principal;
  uncertainty: StatementRecord['uncertainty'];
}

export function PrincipalTable({ principal, uncertainty }: PrincipalTableProps) {
  const { moments, axes, kind, radii } = principal;
  const inertia = chooseDisplayUnit('inertia', moments[2]);
  const length = chooseDisplayUnit('length', radii[2]);
  const momentColumn = writeColumn(moments, uncertainty?.principalMomentsKgM2, inertia);
  const radiusColumn = writeColumn(radii, uncertainty?.radiiOfGyrationM, length);
  return (
    <div className="principal" role="group" aria-label="Principal moments" tabIndex={0}>
      <table className="principal-table">
        <caption className="caption">
          Principal moments <span className="unit">about the centre of mass</span>
        </caption>
        <thead>
          <tr>
            <th scope="col">
              <span className="hidden-visually">Axis</span>
            </th>
            <th scope="col" colSpan={momentColumn.isUncertain ? 2 : 1}>
              <span className="unit">{inertia.symbol}</span>
            </th>
            <th scope="col" colSpan={radiusColumn.isUncertain ? 2 : 1}>
              <span className="unit">radius of gyration, {length.symbol}</span>
            </th>
            <th scope="col">
              <span className="unit principal-direction">
                {(['x', 'y', 'z'] as const).map((letter) => (
                  <span key={letter}>{letter === 'x' ? `direction ${letter}` : letter}</span>
                ))}
              </span>
            </th>
          </tr>
        </thead>
        <tbody>
          {([1, 2, 3] as const).map((number) => (
            <tr key={number}>
              <th scope="row">
                <span className={`axis-numeral axis-numeral-${number}`}>{number}</span>
              </th>
              <ColumnCells column={momentColumn} index={number - 1} isMain />
              <ColumnCells column={radiusColumn} index={number - 1} />
              <td className="figure principal-direction">
                {isAxisUnique(kind, number) ? (
                  (axes[number - 1] ?? []).map((component, index) => <span key={index}>{formatDecimals(component, directionDecimals)}</span>)
                ) : (
                  <span className="soft principal-not-unique">not unique</span>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
      <p className="soft principal-words">{describeAxes(kind)}</p>
    </div>
  );
}
