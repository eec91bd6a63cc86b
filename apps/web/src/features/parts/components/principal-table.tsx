import type { StatementRecord, Vector3 } from '@masswright/contracts';
import { fromSi } from '@masswright/units';
import { PowerText } from '../../../components/figure';
import { createGroupFormat, formatDecimals } from '../../../lib/fixed-figure';
import { describeAxes, isAxisUnique } from '../model/axes-words';
import { chooseDisplayUnit } from '../model/display-units';

const digits = 6;
const directionDecimals = 5;

type Principal = { moments: Vector3; axes: [Vector3, Vector3, Vector3]; kind: NonNullable<StatementRecord['axes']>; radii: Vector3 };

export function findPrincipal({ principalMomentsKgM2, principalAxes, axes, radiiOfGyrationM }: StatementRecord): Principal | undefined {
  if (!principalMomentsKgM2 || !principalAxes || !axes || !radiiOfGyrationM) return undefined;
  return { moments: principalMomentsKgM2, axes: principalAxes, kind: axes, radii: radiiOfGyrationM };
}

export function PrincipalTable({ principal }: { principal: Principal }) {
  const { moments, axes, kind, radii } = principal;
  const inertia = chooseDisplayUnit('inertia', moments[2]);
  const length = chooseDisplayUnit('length', radii[2]);
  const shownMoments = moments.map((moment) => fromSi(moment, inertia));
  const shownRadii = radii.map((radius) => fromSi(radius, length));
  const formatMoment = createGroupFormat(shownMoments, digits);
  const formatRadius = createGroupFormat(shownRadii, digits);
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
            <th scope="col">
              <span className="unit">{inertia.symbol}</span>
            </th>
            <th scope="col">
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
              <td className="figure figure-main"><PowerText text={formatMoment(shownMoments[number - 1] ?? 0)} /></td>
              <td className="figure"><PowerText text={formatRadius(shownRadii[number - 1] ?? 0)} /></td>
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
