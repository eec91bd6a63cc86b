import { Button } from '@blueprintjs/core';
import type { PartRow } from '@masswright/contracts';
import { lengthUnits, type LengthUnit } from '@masswright/units';
import { MenuButton, PanelButton } from '../../../components/menu-button';
import { unitTexts } from '../../../lib/unit-texts';
import type { RowNote as Note } from '../model/state-words';
import type { RowActions } from '../model/use-row-actions';
import { DensityPanel } from './density-panel';

interface RowNoteProps {
  row: PartRow;
  note: Note;
  /** Undefined where the reader may change nothing. */
  actions: RowActions | undefined;
  tabIndex: 0 | -1;
}

export function RowNote({ row, note, actions, tabIndex }: RowNoteProps) {
  const small = { size: 'small', tabIndex } as const;
  return (
    <span className="part-note">
      <span className="part-note-text" title={note.text}>
        {note.text}
      </span>
      {actions && note.ask === 'failed' && (
        <>
          <Button {...small} aria-label={`Measure again: ${row.name}`} onClick={() => actions.onMeasureAgain(row)}>
            Measure again
          </Button>
          {actions.onReplace && (
            <Button {...small} aria-label={`Replace the file: ${row.name}`} onClick={() => actions.onReplace?.(row)}>
              Replace the file
            </Button>
          )}
        </>
      )}
      {actions && note.ask === 'unit' && <UnitMenu tabIndex={tabIndex} row={row} actions={actions} />}
      {actions && note.ask === 'density' && (
        <PanelButton {...small} label="State the density" spoken={`State the density: ${row.name}`}>
          {(close) => (
            <DensityPanel
              label={`Material of ${row.name}`}
              materials={actions.materials}
              onChange={(change) => {
                close();
                actions.onChange(row, change);
              }}
            />
          )}
        </PanelButton>
      )}
      {actions && note.ask === 'unit-doubt' && <DoubtAnswers row={row} actions={actions} tabIndex={tabIndex} />}
    </span>
  );
}

interface AnswersProps {
  row: PartRow;
  actions: RowActions;
  tabIndex: 0 | -1;
}

function UnitMenu({ row, actions, tabIndex }: AnswersProps) {
  return (
    <MenuButton
      size="small"
      tabIndex={tabIndex}
      label="State the unit"
      spoken={`State the unit: ${row.name}`}
      items={lengthUnits.map((unit) => ({ label: unitTexts[unit].name, note: unitTexts[unit].usual, onChoose: () => actions.onStateUnit(row, unit) }))}
    />
  );
}

/** The unit that the volumes speak for, or all six where they speak for none; and the one that was taken over. */
function DoubtAnswers({ row, actions, tabIndex }: AnswersProps) {
  const proposed = row.unitDoubt?.lengthUnit ?? null;
  const stated = row.revision.setting.lengthUnit;
  const answer = (words: string, unit: LengthUnit) => (
    <Button size="small" tabIndex={tabIndex} aria-label={`${words}: ${row.name}`} onClick={() => actions.onStateUnit(row, unit)}>
      {words}
    </Button>
  );
  return (
    <>
      {proposed === null ? <UnitMenu row={row} actions={actions} tabIndex={tabIndex} /> : answer(`Yes, ${unitTexts[proposed].plural}`, proposed)}
      {stated && answer(`Keep ${unitTexts[stated].plural}`, stated)}
    </>
  );
}
