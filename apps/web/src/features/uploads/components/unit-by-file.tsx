import { HTMLSelect } from '@blueprintjs/core';
import { lengthUnit as lengthUnitSchema } from '@masswright/contracts';
import { convertToMetres, formatFigure, lengthUnits } from '@masswright/units';
import { writeRoughLength, writeRoughMass } from '../../../lib/rough-figure';
import { unitTexts } from '../../../lib/unit-texts';
import { isRead } from '../model/quick-figures';
import { computeLongestSide } from '../model/unit-evidence';
import type { UploadEntry } from '../model/upload-entry';
import { stateUploads } from '../model/upload-queue';

function FileRow({ entry, densityKgM3 }: { entry: UploadEntry; densityKgM3: number | null }) {
  const { lengthUnit } = entry.stated;
  const mesh = isRead(entry.quick) ? entry.quick : undefined;
  const size = mesh && lengthUnit ? writeRoughLength(convertToMetres(computeLongestSide(mesh), lengthUnit)) : undefined;
  const mass = mesh && lengthUnit && densityKgM3 !== null ? writeRoughMass(densityKgM3 * convertToMetres(mesh.volume, lengthUnit, 3)) : undefined;
  return (
    <tr>
      <th scope="row" className="file-name">
        {entry.folder && <span className="soft">{entry.folder}/</span>}
        <span className="figure">{entry.fileName}</span>
      </th>
      <td className="numeric figure">{mesh ? formatFigure(computeLongestSide(mesh), { digits: 4 }) : '–'}</td>
      <td>
        <HTMLSelect
          aria-label={`Unit of ${entry.fileName}`}
          value={lengthUnit ?? ''}
          options={[{ value: '', label: 'not stated' }, ...lengthUnits.map((unit) => ({ value: unit, label: unitTexts[unit].name }))]}
          onChange={(event) => stateUploads([entry.key], { lengthUnit: lengthUnitSchema.nullable().parse(event.currentTarget.value || null) })}
        />
      </td>
      <td className="numeric figure">{size ? `${size.figure} ${size.unit}` : '–'}</td>
      <td className="numeric figure">{mass ? `${mass.figure} ${mass.unit}` : '–'}</td>
    </tr>
  );
}

/** The unit of each file by itself; what is chosen counts at once. */
export function UnitByFile({ entries, densityOf }: { entries: readonly UploadEntry[]; densityOf: (entry: UploadEntry) => number | null }) {
  return (
    <div className="unit-by-file" role="region" aria-label="Unit of each file" tabIndex={0}>
      <table className="table">
        <thead>
          <tr>
            <th scope="col">File</th>
            <th scope="col" className="numeric">
              Longest side in the file
            </th>
            <th scope="col">Unit</th>
            <th scope="col" className="numeric">
              Size
            </th>
            <th scope="col" className="numeric">
              Mass
            </th>
          </tr>
        </thead>
        <tbody>
          {entries.map((entry) => (
            <FileRow key={entry.key} entry={entry} densityKgM3={densityOf(entry)} />
          ))}
        </tbody>
      </table>
    </div>
  );
}
