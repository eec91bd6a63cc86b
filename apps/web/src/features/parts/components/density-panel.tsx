import { Button } from '@blueprintjs/core';
import type { Material } from '@masswright/contracts';
import { useState } from 'react';
import { DensityField } from '../../../components/density-field';
import { MaterialPicker } from '../../../components/material-picker';
import { readDensity, writeDensity } from '../../../lib/density';
import type { BulkChange } from '../model/bulk-change';

interface DensityPanelProps {
  /** Of which parts the material is. */
  label: string;
  materials: readonly Material[];
  onChange: (change: BulkChange) => void;
}

/** A material out of the library, or a density that is typed. */
export function DensityPanel({ label, materials, onChange }: DensityPanelProps) {
  const [text, setText] = useState('');
  const { densityKgM3 } = readDensity(text);
  return (
    <div className="panel">
      <div className="panel-material">
        <p className="caption">Material</p>
        <MaterialPicker
          label={label}
          materials={materials}
          value={null}
          autoFocus
          onChange={(material) => material && onChange({ change: { material: { id: material.id } }, about: 'Material', to: material.name })}
        />
      </div>
      <form
        className="panel-density"
        onSubmit={(event) => {
          event.preventDefault();
          if (densityKgM3) onChange({ change: { densityKgM3, densitySpreadKgM3: null }, about: 'Density', to: writeDensity(densityKgM3) });
        }}
      >
        <DensityField label="or a density" text={text} onChange={setText} emptyHint="With its unit, such as 2.7 g/cm3." />
        <Button type="submit" disabled={!densityKgM3}>
          Set the density
        </Button>
      </form>
    </div>
  );
}
