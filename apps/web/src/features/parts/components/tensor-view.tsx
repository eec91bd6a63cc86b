import type { InertiaTensor, Symmetric3 } from '@masswright/contracts';
import { computeTensorPlate } from '@masswright/pictures';
import { fromSi } from '@masswright/units';
import { PictureView } from '../../../components/picture-view';
import { createGroupFormat } from '../../../lib/fixed-figure';
import { chooseDisplayUnit } from '../model/display-units';

const digits = 6;

const rows = [
  ['xx', 'xy', 'zx'],
  ['xy', 'yy', 'yz'],
  ['zx', 'yz', 'zz'],
] as const;

/** The tensor plate, with its caption: a tensor without point, axes, unit and sign convention is half a statement. */
export function TensorView({ tensor }: { tensor: InertiaTensor }) {
  const unit = chooseDisplayUnit('inertia', Math.max(tensor.xx, tensor.yy, tensor.zz));
  const element = (value: number): number => fromSi(value, unit);
  const shown: Symmetric3 = {
    xx: element(tensor.xx),
    yy: element(tensor.yy),
    zz: element(tensor.zz),
    xy: element(tensor.xy),
    yz: element(tensor.yz),
    zx: element(tensor.zx),
  };
  const format = createGroupFormat(Object.values(shown), digits);
  return (
    <figure className="tensor">
      <div className="caption tensor-title">Inertia tensor</div>
      <PictureView picture={computeTensorPlate({ tensor: shown, unit: unit.symbol, format })} />
      {/* The same as the picture, for readers of the screen and for copying as a table. */}
      <table className="hidden-visually">
        <caption>Inertia tensor in {unit.symbol}</caption>
        <tbody>
          {rows.map((row) => (
            <tr key={row[0] + row[1]}>
              {row.map((name, index) => (
                <td key={index}>{format(shown[name])}</td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
      <figcaption>
        <span className="figure">{unit.symbol}</span> about the centre of mass, axes of the mesh frame; off-diagonals are matrix elements,{' '}
        <span className="figure">{tensor.offDiagonals}</span>.
      </figcaption>
    </figure>
  );
}
