import { computeScalePicture } from '@masswright/pictures';
import { convertToMetres, type LengthUnit } from '@masswright/units';
import type { FileFigures } from '@masswright/geometry/web-worker';
import { useMemo } from 'react';
import { PictureView } from '../../../components/picture-view';
import { sayRoughLength } from '../../../lib/rough-figure';
import { unitTexts } from '../../../lib/unit-texts';

const letters = { x: 0, y: 1, z: 2 } as const;

/** The extents as they are seen: along the shortest side of the box, unless an outline says otherwise. */
function chooseView({ boundingBox: { min, max }, silhouette }: FileFigures): { width: number; height: number } {
  const sides = [0, 1, 2].map((k) => (max[k] ?? 0) - (min[k] ?? 0));
  if (silhouette) return { width: sides[letters[silhouette.horizontal]] ?? 0, height: sides[letters[silhouette.vertical]] ?? 0 };
  const [height = 0, width = 0] = [...sides].sort((a, b) => b - a);
  return { width, height };
}

/** The mesh of middle size beside a coin, a hand and a door, were its unit the one that is looked at. */
export function UnitPicture({ mesh, fileName, lengthUnit }: { mesh: FileFigures; fileName: string; lengthUnit: LengthUnit }) {
  const picture = useMemo(() => {
    const { width, height } = chooseView(mesh);
    const outline = mesh.silhouette;
    return computeScalePicture({ widthM: convertToMetres(width, lengthUnit), heightM: convertToMetres(height, lengthUnit), outline, format: sayRoughLength });
  }, [mesh, lengthUnit]);
  return (
    <figure className="unit-picture">
      <PictureView picture={picture} />
      <figcaption className="soft">
        <span className="figure file-name">{fileName}</span> in {unitTexts[lengthUnit].plural}, to scale
      </figcaption>
    </figure>
  );
}
