import type { Openings } from '@masswright/contracts';
import { formatCount, formatFigure, type LengthUnit } from '@masswright/units';
import { PowerText } from '../../../components/figure';
import { writeMeshPlace, writeMeshUnit, type Box } from '../model/mesh-words';
import { describeOpenings, describeOpenVolume } from '../model/opening-words';
import { Fact } from './section';

const shownLoops = 8;

/** Where the surface ends: its loops, and what hangs on them. */
export function OpeningsFact({ openings, box, unit }: { openings: Openings; box: Box; unit: LengthUnit | null }) {
  const symbol = writeMeshUnit(unit) || 'mesh unit';
  const shown = openings.loops.slice(0, shownLoops);
  return (
    <Fact name="Openings">
      <p className="fact-words">
        {describeOpenings(openings)} {describeOpenVolume(openings, unit)}
      </p>
      {shown.length > 0 && (
        <div className="small-table-frame" role="group" aria-label="Openings" tabIndex={0}>
          <table className="small-table">
            <thead>
              <tr>
                <th scope="col" className="numeric">
                  Edges
                </th>
                <th scope="col" className="numeric">
                  Length <span className="unit">{symbol}</span>
                </th>
                <th scope="col" className="numeric">
                  Width <span className="unit">{symbol}</span>
                </th>
                <th scope="col">
                  About the point <span className="unit">x, y, z in {symbol}</span>
                </th>
              </tr>
            </thead>
            <tbody>
              {shown.map(({ edges, length, width, centre }) => (
                <tr key={centre.join()}>
                  <td className="figure numeric">{formatCount(edges)}</td>
                  <td className="figure numeric"><PowerText text={formatFigure(length, { digits: 4 })} /></td>
                  <td className="figure numeric"><PowerText text={formatFigure(width, { digits: 3 })} /></td>
                  <td className="figure">{writeMeshPlace(centre, box)}</td>
                </tr>
              ))}
            </tbody>
          </table>
          {openings.loopCount > shown.length && <p className="soft">The {shownLoops} longest of {formatCount(openings.loopCount)}.</p>}
        </div>
      )}
    </Fact>
  );
}
