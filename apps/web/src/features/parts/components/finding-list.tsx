import type { Finding } from '@masswright/contracts';
import { formatCount, type LengthUnit } from '@masswright/units';
import { describeFinding } from '../model/finding-words';
import { writeMeshPlace, writeMeshUnit, type Box } from '../model/mesh-words';

const shownFacets = 6;

interface MeshFrame {
  box: Box;
  unit: LengthUnit | null;
}

/** Facets by their numbers in the file, as an editor counts them. */
function Facets({ facets }: Pick<Finding, 'facets'>) {
  if (facets.length === 0) return null;
  return (
    <span className="soft">
      {' '}
      Facet{facets.length > 1 && 's'} <span className="figure">{facets.slice(0, shownFacets).map((facet) => formatCount(facet + 1)).join(', ')}</span>
      {facets.length > shownFacets && ' …'}, counted from 1.
    </span>
  );
}

/** The first of the lines where it is, in the mesh's own unit and frame. */
function FirstLine({ lines, box, unit }: Pick<Finding, 'lines'> & MeshFrame) {
  const [first] = lines;
  if (!first) return null;
  const [ax, ay, az, bx, by, bz] = first;
  const symbol = writeMeshUnit(unit);
  return (
    <span className="soft">
      {' '}
      {lines.length > 1 ? 'The first is' : 'It is'} at <span className="figure place">({writeMeshPlace([ax, ay, az], box)})</span> to <span className="figure place">({writeMeshPlace([bx, by, bz], box)})</span>
      {symbol && ` ${symbol}`}.
    </span>
  );
}

/** What was found in a mesh, each with what it means and where it is. */
export function FindingList({ findings, ...frame }: { findings: readonly Finding[] } & MeshFrame) {
  return (
    <ul className="findings">
      {findings.map((finding) => (
        <li key={finding.kind}>
          {describeFinding(finding)}
          <Facets facets={finding.facets} />
          <FirstLine lines={finding.lines} {...frame} />
        </li>
      ))}
    </ul>
  );
}
