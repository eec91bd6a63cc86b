import type { StatementRecord, Vector3 } from '@masswright/contracts';
import { computeBeam } from '@masswright/pictures';
import { fromSi } from '@masswright/units';
import { PictureView } from '../../../components/picture-view';
import { createGroupFormat } from '../../../lib/fixed-figure';
import { chooseDisplayUnit } from '../model/display-units';

const digits = 6;
const axes = ['x', 'y', 'z'] as const;

/** The centre of mass along each axis of the mesh frame, within the bounding box. */
export function Balance({ box, centreM }: { box: StatementRecord['boundingBoxM']; centreM: Vector3 }) {
  const unit = chooseDisplayUnit('length', 0);
  const shown = (value: number | undefined): number => fromSi(value ?? 0, unit);
  const all = [...box.min, ...box.max, ...centreM].map(shown);
  const format = createGroupFormat(all, digits);
  return (
    <figure className="balance">
      <div className="caption">
        Centre of mass <span className="unit">in the bounding box, axes of the mesh frame</span>
      </div>
      <div className="balance-beams">
        {axes.map((axis, index) => (
          <PictureView
            key={axis}
            picture={computeBeam({ axis, minimum: shown(box.min[index]), maximum: shown(box.max[index]), centre: shown(centreM[index]), unit: unit.symbol, format })}
          />
        ))}
      </div>
    </figure>
  );
}
