import { Button } from '@blueprintjs/core';
import type { Material } from '@masswright/contracts';
import { Fragment } from 'react';
import { findDeclaredMaterials } from '../model/declared-materials';

interface DeclaredMaterialsProps {
  names: readonly string[];
  materials: readonly Material[];
  /** Undefined where the reader may change nothing. */
  onTake: ((material: Material) => void) | undefined;
}

/** What the file calls its materials. It states no density, so a name is only a proposal. */
export function DeclaredMaterials({ names, materials, onTake }: DeclaredMaterialsProps) {
  const declared = findDeclaredMaterials(names, materials);
  if (declared.length === 0) return null;
  const proposals = new Map(declared.flatMap((one) => one.proposals).map((material) => [material.id, material]));
  return (
    <p className="declared">
      The file names its material{declared.length > 1 && 's'}{' '}
      {declared.map(({ name }, index) => (
        <Fragment key={name}>
          {index > 0 && ', '}“{name}”
        </Fragment>
      ))}
      {proposals.size === 0 ? '; the library has no entry of that name.' : '.'}{' '}
      {onTake &&
        [...proposals.values()].map((material) => (
          <Button key={material.id} size="small" className="screen-only" onClick={() => onTake(material)}>
            Take {material.name}
          </Button>
        ))}
    </p>
  );
}
