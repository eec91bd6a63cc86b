import type { PartRow } from '@masswright/contracts';
import type { LengthUnit } from '@masswright/units';
import { useMemo } from 'react';
import { unitTexts } from '../../../lib/unit-texts';
import { changeSettings } from '../api/part-changes';
import { useMeasureAgain, useStateUnit } from '../api/parts';
import type { ChangeSteps } from './change-steps';

export interface RowActions {
  onStateUnit: (row: PartRow, unit: LengthUnit) => void;
  onMeasureAgain: (row: PartRow) => void;
  /** Opens the choice of another file for the part; absent where the page has none. */
  onReplace?: (row: PartRow) => void;
}

/** What a person can do about one part from its row; the same functions from draw to draw, so that rows needn't be drawn again. */
export function useRowActions(projectId: string, steps: ChangeSteps, onReplace: RowActions['onReplace']): { actions: RowActions; error: unknown } {
  const { mutate: stateUnit, error: unitError } = useStateUnit();
  const { mutate: measureAgain, error: runError } = useMeasureAgain();
  const actions = useMemo<RowActions>(
    () => ({
      onStateUnit: (row, unit) => {
        const { lengthUnit, version } = row.revision.setting;
        // Keeping the unit changes no figure: it only says that a person has looked.
        if (unit === lengthUnit) stateUnit({ partId: row.id, lengthUnit: unit, version });
        else {
          void steps.take(async () => {
            const change = await changeSettings(projectId, { ids: [row.id] }, { lengthUnit: unit });
            return { kind: 'setting', change, about: 'Unit', to: unitTexts[unit].name };
          });
        }
      },
      onMeasureAgain: (row) => measureAgain(row.id),
      onReplace,
    }),
    [projectId, steps, onReplace, stateUnit, measureAgain],
  );
  return { actions, error: unitError ?? runError };
}
