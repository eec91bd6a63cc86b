import type { InertiaTensor, Symmetric3 } from '@masswright/contracts';
import { computeTensorPlate } from '@masswright/pictures';
import { fromSi } from '@masswright/units';
import { PictureView } from '../../../components/picture-view';
import { createGroupFormat, needsPowerOfTen } from '../../../lib/fixed-figure';
import { countDecimals, writeUncertain } from '../../../lib/uncertain-figure';
import { chooseDisplayUnit } from '../model/display-units';

const digits = 6;

const rows = [
  ['xx', 'xy', 'zx'],
  ['xy', 'yy', 'yz'],
  ['zx', 'yz', 'zz'],
] as const;

type Elements = keyof Symmetric3;
const elements: readonly Elements[] = ['xx', 'yy', 'zz', 'xy', 'yz', 'zx'];
const gap = '\u00a0';

interface ElementTexts {
  format: (value: number, element: Elements) => string;
  formatBelow?: (element: Elements) => string;
}

/** Each element rounded by its uncertainty, no further than the largest is, and filled up so that the points stand under one another. */
function writeElements(shown: Symmetric3, spreads: Symmetric3 | null): ElementTexts {
  const largest = elements.reduce((best, element) => (Math.abs(shown[element]) > Math.abs(shown[best]) ? element : best));
  if (!spreads || needsPowerOfTen(shown[largest], digits)) return { format: createGroupFormat(Object.values(shown), digits) };
  const mostDecimals = countDecimals(shown[largest], spreads[largest]);
  const written = new Map(elements.map((element) => [element, writeUncertain(shown[element], spreads[element], { mostDecimals })]));
  const tailOf = (text: string): number => (text.includes('.') ? text.length - text.indexOf('.') : 0);
  const tail = Math.max(...[...written.values()].map(({ value }) => tailOf(value)));
  const fill = (text: string): string => text + gap.repeat(Math.max(0, tail - tailOf(text)));
  return { format: (_, element) => fill(written.get(element)?.value ?? ''), formatBelow: (element) => fill(`±${gap}${written.get(element)?.spread ?? ''}`) };
}

/** The tensor plate, with its caption: a tensor without point, axes, unit and sign convention is half a statement. */
export function TensorView({ tensor, uncertainty }: { tensor: InertiaTensor; uncertainty: Symmetric3 | null }) {
  const unit = chooseDisplayUnit('inertia', Math.max(tensor.xx, tensor.yy, tensor.zz));
  const element = (value: number): number => fromSi(value, unit);
  const convert = ({ xx, yy, zz, xy, yz, zx }: Symmetric3): Symmetric3 => ({ xx: element(xx), yy: element(yy), zz: element(zz), xy: element(xy), yz: element(yz), zx: element(zx) });
  const shown = convert(tensor);
  const texts = writeElements(shown, uncertainty && convert(uncertainty));
  return (
    <figure className="tensor">
      <div className="caption tensor-title">Inertia tensor</div>
      <PictureView picture={computeTensorPlate({ tensor: shown, unit: unit.symbol, ...texts })} />
      {/* The same as the picture, for readers of the screen and for copying as a table. */}
      {/* A table is never narrower than what is in it: only a box around it can be. */}
      <div className="hidden-visually">
        <table>
          <caption>Inertia tensor in {unit.symbol}</caption>
          <tbody>
            {rows.map((row) => (
              <tr key={row[0] + row[1]}>
                {row.map((name, index) => (
                  <td key={index}>{[texts.format(shown[name], name), texts.formatBelow?.(name) ?? ''].join(' ').trim()}</td>
                ))}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <figcaption>
        <span className="figure">{unit.symbol}</span> about the centre of mass, axes of the mesh frame; off-diagonals are matrix elements,{' '}
        <span className="figure">{tensor.offDiagonals}</span>.
      </figcaption>
    </figure>
  );
}
