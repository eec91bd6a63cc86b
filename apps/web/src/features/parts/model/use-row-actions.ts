import type { Material, PartRow } from '@masswright/contracts';
import type { LengthUnit } from '@masswright/units';
import { useMemo } from 'react';
import { unitTexts } from '../../../lib/unit-texts';
import { changeSettings } from '../api/part-changes';
import { useMeasureAgain, useStateUnit } from '../api/parts';
import type { BulkChange } from './bulk-change';
import type { ChangeSteps } from './change-steps';

export interface RowActions {
  onStateUnit: (row: PartRow, unit: LengthUnit) => void;
  onChange: (row: PartRow, change: BulkChange) => void;
  onMeasureAgain: (row: PartRow) => void;
  /** Opens the choice of another file for the part; absent where the page has none. */
  onReplace?: (row: PartRow) => void;
  /** The library that a part's material is taken out of. */
  materials: readonly Material[];
}

interface RowActionsParts extends Pick<RowActions, 'materials' | 'onReplace'> {
  projectId: string;
  steps: ChangeSteps;
}

/** What a person can do about one part from its row; the same functions from draw to draw, so that rows needn't be drawn again. */
export function useRowActions({ projectId, steps, materials, onReplace }: RowActionsParts): { actions: RowActions; error: unknown } {
  const { mutate: stateUnit, error: unitError } = useStateUnit();
  const { mutate: measureAgain, error: runError } = useMeasureAgain();
  const actions = useMemo<RowActions>(() => {
    const onChange: RowActions['onChange'] = (row, { change: wanted, about, to }) => {
      void steps.take(async () => {
        const change = await changeSettings(projectId, { ids: [row.id] }, wanted);
        return { kind: 'setting', change, about, to };
      });
    };
    return {
      onChange,
      onStateUnit: (row, unit) => {
        const { lengthUnit, version } = row.revision.setting;
        // Keeping the unit changes no figure: it only says that a person has looked.
        if (unit === lengthUnit) stateUnit({ partId: row.id, lengthUnit: unit, version });
        else onChange(row, { change: { lengthUnit: unit }, about: 'Unit', to: unitTexts[unit].name });
      },
      onMeasureAgain: (row) => measureAgain(row.id),
      onReplace,
      materials,
    };
  }, [projectId, steps, materials, onReplace, stateUnit, measureAgain]);
  return { actions, error: unitError ?? runError };
}
