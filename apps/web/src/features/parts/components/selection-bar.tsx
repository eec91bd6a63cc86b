import { Button } from '@blueprintjs/core';
import type { ChangeSettingsRequest, Material } from '@masswright/contracts';
import { formatCount, lengthUnits } from '@masswright/units';
import { useState } from 'react';
import { DensityField } from '../../../components/density-field';
import { MaterialPicker } from '../../../components/material-picker';
import { MenuButton, PanelButton } from '../../../components/menu-button';
import { readDensity, writeDensity } from '../../../lib/density';
import { unitTexts } from '../../../lib/unit-texts';
import { axisChoices, computeSimpleAxis } from '../model/axis-choice';

export interface BulkChange {
  change: ChangeSettingsRequest['change'];
  /** What is changed, and to what, for the sentence about it. */
  about: string;
  to: string;
}

interface SelectionBarProps {
  count: number;
  materials: readonly Material[];
  isBusy: boolean;
  isDeletedView: boolean;
  onChange: (change: BulkChange) => void;
  onDelete: () => void;
  onRestore: () => void;
  onClear: () => void;
}

function MaterialPanel({ materials, onChange }: Pick<SelectionBarProps, 'materials'> & { onChange: (change: BulkChange) => void }) {
  const [text, setText] = useState('');
  const { densityKgM3 } = readDensity(text);
  return (
    <div className="panel">
      <div className="panel-material">
        <p className="caption">Material</p>
        <MaterialPicker
          label="Material for the selected parts"
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

/** What can be done with the parts that are selected. */
export function SelectionBar({ count, materials, isBusy, isDeletedView, onChange, onDelete, onRestore, onClear }: SelectionBarProps) {
  const small = { size: 'small', disabled: isBusy } as const;
  return (
    <div className="selection-bar" role="toolbar" aria-label="With the selected parts">
      <b role="status">
        <span className="figure">{formatCount(count)}</span> selected
      </b>
      {isDeletedView ? (
        <Button {...small} onClick={onRestore}>
          Restore
        </Button>
      ) : (
        <>
          <MenuButton
            {...small}
            label="Unit"
            spoken="Unit of the selected parts"
            items={lengthUnits.map((unit) => ({ label: unitTexts[unit].name, note: unitTexts[unit].usual, onChoose: () => onChange({ change: { lengthUnit: unit }, about: 'Unit', to: unitTexts[unit].name }) }))}
          />
          <PanelButton {...small} label="Material" spoken="Material of the selected parts">
            {(close) => (
              <MaterialPanel
                materials={materials}
                onChange={(change) => {
                  close();
                  onChange(change);
                }}
              />
            )}
          </PanelButton>
          <MenuButton
            {...small}
            label="Axis"
            spoken="Axis of the selected parts"
            items={axisChoices.flatMap(({ value, label, spoken = label }) => {
              const axis = computeSimpleAxis(value);
              return axis ? [{ label: spoken, onChoose: () => onChange({ change: { axis }, about: 'Axis', to: spoken.toLowerCase().replace(/ [xyz]$/, (letter) => letter.toUpperCase()) }) }] : [];
            })}
          />
          <Button {...small} onClick={onDelete}>
            Delete
          </Button>
        </>
      )}
      <Button {...small} variant="minimal" onClick={onClear}>
        Clear <kbd>Esc</kbd>
      </Button>
    </div>
  );
}
