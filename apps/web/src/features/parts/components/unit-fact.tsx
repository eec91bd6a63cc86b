import { Button, HTMLSelect } from '@blueprintjs/core';
import { lengthUnit as lengthUnitSchema, type Part } from '@masswright/contracts';
import { lengthUnits } from '@masswright/units';
import { MenuButton } from '../../../components/menu-button';
import { Notice } from '../../../components/notice';
import { ProblemNotice } from '../../../components/problem-notice';
import { formatMoment } from '../../../lib/format-time';
import { unitTexts } from '../../../lib/unit-texts';
import { useStateUnit } from '../api/parts';
import { describeRatio } from '../model/doubt-words';
import type { SettingEditor, SettingEditorState } from '../model/setting-editor';
import { Fact } from './section';

interface UnitFactProps {
  part: Part;
  editor: SettingEditor;
  state: SettingEditorState;
}

/** Who says that it is this unit: a person for this file, or nobody yet. */
function describeOrigin({ part, state }: Pick<UnitFactProps, 'part' | 'state'>): string {
  const { draft, saved } = state;
  const declared = part.revision.measurement?.declaredUnit ?? null;
  if (draft.lengthUnit === null) return declared === null ? 'The file does not say it, and none is assumed.' : `The file says it is in ${unitTexts[declared].plural}.`;
  if (draft.lengthUnit !== saved.lengthUnit) return 'stated by you, just now';
  if (saved.unitStated) return `stated by ${saved.unitStated.by}, ${formatMoment(saved.unitStated.at)}`;
  const before = part.revisions[1];
  return before ? `taken over from revision ${before.letter}; nobody has stated it for this file` : '';
}

/** What the file itself says, as long as that is not what is stated. */
function Declared({ part, editor, state }: UnitFactProps) {
  const declared = part.revision.measurement?.declaredUnit ?? null;
  const { lengthUnit } = state.draft;
  if (declared === null || declared === lengthUnit) return null;
  const { plural } = unitTexts[declared];
  return (
    <p className="declared">
      {lengthUnit !== null && `The file says ${plural}. `}
      {part.can.edit && (
        <Button size="small" className="screen-only" onClick={() => editor.change({ lengthUnit: declared })}>
          Take {plural}
        </Button>
      )}
    </p>
  );
}

/** A new revision whose volume does not fit the unit that it took over. */
function Doubt({ part, editor, state }: UnitFactProps) {
  const stateUnit = useStateUnit();
  const { unitDoubt: doubt, can } = part;
  const { saved, draft } = state;
  const { lengthUnit } = saved;
  const proposed = doubt?.lengthUnit ?? null;
  if (!doubt || lengthUnit === null || draft.lengthUnit !== lengthUnit) return null;
  const before = part.revisions[1];
  return (
    <Notice tone="doubt">
      <p>
        <b>Is the unit right?</b> Its volume is {describeRatio(doubt)} that of revision {before?.letter ?? 'before'},{' '}
        {proposed === null
          ? `as if one unit had been taken for another, but none of the six brings the two volumes together. State the unit, or keep ${unitTexts[lengthUnit].plural}.`
          : `as if ${unitTexts[proposed].plural} had been taken for ${unitTexts[lengthUnit].plural}.`}
      </p>
      {can.edit && (
        <div className="notice-actions screen-only">
          {proposed === null ? (
            <MenuButton
              size="small"
              label="State the unit"
              items={lengthUnits.filter((unit) => unit !== lengthUnit).map((unit) => ({ label: unitTexts[unit].name, note: unitTexts[unit].usual, onChoose: () => editor.change({ lengthUnit: unit }) }))}
            />
          ) : (
            <Button size="small" onClick={() => editor.change({ lengthUnit: proposed })}>
              These are {unitTexts[proposed].plural}
            </Button>
          )}
          <Button size="small" loading={stateUnit.isPending} onClick={() => stateUnit.mutate({ partId: part.id, lengthUnit, version: saved.version })}>
            Keep {unitTexts[lengthUnit].plural}
          </Button>
        </div>
      )}
      {stateUnit.error && <ProblemNotice error={stateUnit.error} />}
    </Notice>
  );
}

/** In which unit the mesh is, who says so, and whether that can be doubted. */
export function UnitFact({ part, editor, state }: UnitFactProps) {
  const { draft } = state;
  return (
    <Fact name="Unit">
      {part.can.edit ? (
        <HTMLSelect
          aria-label="Unit"
          value={draft.lengthUnit ?? ''}
          options={[{ value: '', label: 'not stated' }, ...lengthUnits.map((value) => ({ value, label: unitTexts[value].name }))]}
          onChange={(event) => editor.change({ lengthUnit: lengthUnitSchema.nullable().parse(event.currentTarget.value || null) })}
        />
      ) : draft.lengthUnit ? (
        unitTexts[draft.lengthUnit].name
      ) : (
        'not stated'
      )}{' '}
      <span className="soft">{describeOrigin({ part, state })}</span>
      <Declared part={part} editor={editor} state={state} />
      <Doubt part={part} editor={editor} state={state} />
    </Fact>
  );
}
