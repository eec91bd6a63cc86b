import { Button } from '@blueprintjs/core';
import type { Material } from '@masswright/contracts';
import { formatCount } from '@masswright/units';
import { Fragment } from 'react';
import { Link } from 'react-router-dom';
import { StatusTag } from '../../../components/status-tag';
import { groupMaterials, writePlain } from '../../../lib/material-words';
import { basisWords, describeSpread } from '../model/material-form';
import './materials.css';

interface MaterialTableProps {
  materials: readonly Material[];
  onChange: (material: Material) => void;
  onArchive: (material: Material, archived: boolean) => void;
}

/** Digits behind the point, so that the points of a column stand under one another. */
function countDecimals(materials: readonly Material[]): number {
  return Math.max(0, ...materials.map(({ densityKgM3 }) => (String(Number(densityKgM3.toPrecision(6))).split('.')[1] ?? '').length));
}

function Density({ value, decimals }: { value: number; decimals: number }) {
  const text = writePlain(value, 6);
  const fraction = text.split('.')[1];
  const room = decimals === 0 ? 0 : decimals + 1 - (fraction === undefined ? 0 : fraction.length + 1);
  return (
    <span className="figure figure-aligned">
      {text}
      {room > 0 && <span className="figure-tail" style={{ width: `${room}ch` }} />}
    </span>
  );
}

/** The library by families; what can be changed is the organisation's own. */
export function MaterialTable({ materials, onChange, onArchive }: MaterialTableProps) {
  const decimals = countDecimals(materials);
  const hasActions = materials.some(({ can }) => can.edit);
  const columns = hasActions ? 7 : 6;
  return (
    <div className="table-frame" role="region" aria-label="Materials" tabIndex={0}>
      <table className="table material-table">
        <thead>
          <tr>
            <th scope="col">Material</th>
            <th scope="col" className="numeric">
              Density <span className="unit">kg/m³</span>
            </th>
            <th scope="col">Spread ±</th>
            <th scope="col">Spread by</th>
            <th scope="col">Source</th>
            <th scope="col" className="numeric">
              Parts
            </th>
            {hasActions && (
              <th scope="col" className="screen-only">
                <span className="hidden-visually">Changes</span>
              </th>
            )}
          </tr>
        </thead>
        {groupMaterials(materials).map(({ group, name, items }) => (
          <Fragment key={group}>
            <tbody>
              <tr className="material-family">
                <th scope="rowgroup" colSpan={columns}>
                  {name}
                </th>
              </tr>
              {items.map((material) => (
                <tr key={material.id}>
                  <th scope="row">
                    <Link to={`/materials/${encodeURIComponent(material.id)}`}>{material.name}</Link> {material.origin === 'own' && <span className="soft">own</span>}{' '}
                    {material.archivedAt !== null && (
                      <StatusTag tone="neutral" plain>
                        archived
                      </StatusTag>
                    )}
                  </th>
                  <td className="numeric">
                    <Density value={material.densityKgM3} decimals={decimals} />
                  </td>
                  <td className="figure material-spread">{describeSpread(material)}</td>
                  <td className="soft">{basisWords[material.spreadBasis]}</td>
                  <td className="soft material-source">{material.source}</td>
                  <td className="numeric figure">{material.usedByParts > 0 ? <Link to={`/materials/${encodeURIComponent(material.id)}`}>{formatCount(material.usedByParts)}</Link> : '–'}</td>
                  {hasActions && (
                    <td className="material-actions screen-only">
                      {material.can.edit && material.archivedAt === null && (
                        <>
                          <Button size="small" aria-label={`Change ${material.name}`} onClick={() => onChange(material)}>
                            Change
                          </Button>
                          <Button size="small" variant="minimal" aria-label={`Archive ${material.name}`} onClick={() => onArchive(material, true)}>
                            Archive
                          </Button>
                        </>
                      )}
                      {material.can.edit && material.archivedAt !== null && (
                        <Button size="small" aria-label={`Unarchive ${material.name}`} onClick={() => onArchive(material, false)}>
                          Unarchive
                        </Button>
                      )}
                    </td>
                  )}
                </tr>
              ))}
            </tbody>
          </Fragment>
        ))}
      </table>
    </div>
  );
}
