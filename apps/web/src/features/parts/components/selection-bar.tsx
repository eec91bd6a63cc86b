import { Button } from '@blueprintjs/core';
import type { Material } from '@masswright/contracts';
import { formatCount, lengthUnits } from '@masswright/units';
import { MenuButton, PanelButton } from '../../../components/menu-button';
import { unitTexts } from '../../../lib/unit-texts';
import { axisChoices, computeSimpleAxis } from '../model/axis-choice';
import type { BulkChange } from '../model/bulk-change';
import { DensityPanel } from './density-panel';

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
              <DensityPanel
                label="Material for the selected parts"
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
