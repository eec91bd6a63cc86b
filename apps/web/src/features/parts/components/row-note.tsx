import { Button } from '@blueprintjs/core';
import type { PartRow, UnitDoubt } from '@masswright/contracts';
import { formatCount, lengthUnits } from '@masswright/units';
import { MenuButton } from '../../../components/menu-button';
import { unitTexts } from '../../../lib/unit-texts';
import { findNote, type RowNote as Note } from '../model/state-words';
import type { RowActions } from '../model/use-row-actions';

/** How a volume stands to the one before, in the words of a row. */
export function describeRatio({ volumeRatio }: UnitDoubt): string {
  return volumeRatio >= 1 ? `${formatCount(Math.round(volumeRatio))} times` : `1/${formatCount(Math.round(1 / volumeRatio))} of`;
}

/** What stands in a row instead of its figures; undefined where the figures do. */
export function findRowNote(row: PartRow): Note | undefined {
  const { unitDoubt } = row;
  if (row.state !== 'unit-doubt' || !unitDoubt) return findNote(row);
  return { text: `${describeRatio(unitDoubt)} the volume before: ${unitTexts[unitDoubt.lengthUnit].plural}?`, ask: 'unit-doubt' };
}

interface RowNoteProps {
  row: PartRow;
  note: Note;
  /** Undefined where the reader may change nothing. */
  actions: RowActions | undefined;
  tabIndex: 0 | -1;
}

export function RowNote({ row, note, actions, tabIndex }: RowNoteProps) {
  const small = { size: 'small', tabIndex } as const;
  const { unitDoubt } = row;
  const stated = row.revision.setting.lengthUnit;
  return (
    <span className="part-note">
      <span className="part-note-text" title={note.text}>
        {note.text}
      </span>
      {actions && note.ask === 'failed' && (
        <>
          <Button {...small} onClick={() => actions.onMeasureAgain(row)}>
            Measure again
          </Button>
          {actions.onReplace && (
            <Button {...small} onClick={() => actions.onReplace?.(row)}>
              Replace the file
            </Button>
          )}
        </>
      )}
      {actions && note.ask === 'unit' && (
        <MenuButton
          {...small}
          label="State the unit"
          spoken={`State the unit of ${row.name}`}
          items={lengthUnits.map((unit) => ({ label: unitTexts[unit].name, note: unitTexts[unit].usual, onChoose: () => actions.onStateUnit(row, unit) }))}
        />
      )}
      {actions && note.ask === 'unit-doubt' && unitDoubt && (
        <>
          <Button {...small} aria-label={`${row.name}: these are ${unitTexts[unitDoubt.lengthUnit].plural}`} onClick={() => actions.onStateUnit(row, unitDoubt.lengthUnit)}>
            Yes, {unitTexts[unitDoubt.lengthUnit].plural}
          </Button>
          {stated && (
            <Button {...small} aria-label={`${row.name}: keep ${unitTexts[stated].plural}`} onClick={() => actions.onStateUnit(row, stated)}>
              Keep {unitTexts[stated].plural}
            </Button>
          )}
        </>
      )}
    </span>
  );
}
