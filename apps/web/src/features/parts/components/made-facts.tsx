import type { StatementRecord } from '@masswright/contracts';
import { StatusTag } from '../../../components/status-tag';
import { TypedField } from '../../../components/typed-field';
import { describeAsMade, readAsMade, writeAsMade } from '../model/typed-as-made';
import { describeTypedWeighing, readTypedWeighing, writeTypedWeighing } from '../model/typed-density';
import { describeWeighing } from '../model/weighing-words';
import type { SettingEditor, SettingEditorState } from '../model/setting-editor';
import { Fact } from './section';

interface MadeFactsProps {
  editor: SettingEditor;
  state: SettingEditorState;
  canEdit: boolean;
  statement: StatementRecord | undefined;
}

/** What is known of the part as it was made: its weight, and how far its shape may be off. */
export function MadeFacts({ editor, state: { draft }, canEdit, statement }: MadeFactsProps) {
  const weighing = draft.weighing && describeWeighing(statement?.weighing, draft);
  const verdict = weighing && (
    <p className="weighing-verdict">
      <StatusTag tone={weighing.tone}>{weighing.word}</StatusTag> {weighing.words}
    </p>
  );
  const asMade = draft.asMade ?? null;
  return (
    <>
      {(canEdit || draft.weighing) && (
        <Fact name="Weighed">
          {canEdit ? (
            <TypedField
              label="Weighed mass"
              value={draft.weighing}
              write={writeTypedWeighing}
              read={readTypedWeighing}
              describe={describeTypedWeighing}
              emptyHint="What the scale said, and how sure it is (k = 2)."
              placeholder="0.311 kg ± 0.002 kg"
              consequence={verdict}
              onChange={(typed) => editor.change({ weighing: typed })}
            />
          ) : (
            <>
              <span className="figure">{writeTypedWeighing(draft.weighing)}</span>
              {verdict}
            </>
          )}
        </Fact>
      )}
      {(canEdit || asMade) && (
        <Fact name="As made">
          {canEdit ? (
            <TypedField
              label="Tolerance as made"
              value={asMade}
              write={writeAsMade}
              read={readAsMade}
              describe={describeAsMade}
              emptyHint="How far the part may differ from the mesh: a share of all lengths, or a distance along the surface’s normal."
              placeholder="± 0.3 % or ± 0.1 mm"
              onChange={(typed) => editor.change({ asMade: typed })}
            />
          ) : (
            asMade && (
              <>
                <span className="figure">{writeAsMade(asMade)}</span> <span className="soft">{describeAsMade(asMade)}</span>
              </>
            )
          )}
        </Fact>
      )}
    </>
  );
}
