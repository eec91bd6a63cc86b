import type { StatementRecord, Vector3 } from '@masswright/contracts';
import { computeBeam } from '@masswright/pictures';
import { fromSi } from '@masswright/units';
import { PictureView } from '../../../components/picture-view';
import { chooseDecimals, createGroupFormat, needsPowerOfTen } from '../../../lib/fixed-figure';
import { writeUncertain } from '../../../lib/uncertain-figure';
import { chooseDisplayUnit } from '../model/display-units';

const digits = 6;
const axes = ['x', 'y', 'z'] as const;

/** The centre with its ±; undefined where the ends' way of writing serves it as well. */
function writeCentre(centre: number, uncertainty: number | undefined, mostDecimals: number): string | undefined {
  if (uncertainty === undefined) return undefined;
  const { value, spread } = writeUncertain(centre, uncertainty, { mostDecimals });
  return `${value} ± ${spread ?? ''}`;
}

interface BalanceProps {
  box: StatementRecord['boundingBoxM'];
  centreM: Vector3;
  /** Expanded, k = 2; null where there is none. */
  uncertaintyM: Vector3 | null;
}

/** The centre of mass along each axis of the mesh frame, within the bounding box. */
export function Balance({ box, centreM, uncertaintyM }: BalanceProps) {
  const unit = chooseDisplayUnit('length', 0);
  const shown = (value: number | undefined): number => fromSi(value ?? 0, unit);
  const all = [...box.min, ...box.max, ...centreM].map(shown);
  const format = createGroupFormat(all, digits);
  // A centre that is nothing beside the box needs no power of ten of its own. A body too small or too large for plain digits has no ± in its picture.
  const isPlain = !needsPowerOfTen(Math.max(...all.map(Math.abs)), digits);
  const mostDecimals = chooseDecimals(all, digits + 1);
  return (
    <figure className="balance">
      <div className="caption">
        Centre of mass <span className="unit">in the bounding box, axes of the mesh frame</span>
      </div>
      <div className="balance-beams">
        {axes.map((axis, index) => {
          const centre = shown(centreM[index]);
          const text = writeCentre(centre, uncertaintyM && isPlain ? shown(uncertaintyM[index]) : undefined, mostDecimals);
          const ends = { minimum: shown(box.min[index]), maximum: shown(box.max[index]) };
          return <PictureView key={axis} picture={computeBeam({ axis, ...ends, centre, unit: unit.symbol, format, ...(text === undefined ? {} : { formatCentre: () => text }) })} />;
        })}
      </div>
    </figure>
  );
}
