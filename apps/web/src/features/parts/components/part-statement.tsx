import { Button } from '@blueprintjs/core';
import type { Material, Part } from '@masswright/contracts';
import { computeStatement } from '@masswright/mechanics';
import { useMemo } from 'react';
import { ProblemNotice } from '../../../components/problem-notice';
import { useMeasureAgain } from '../api/parts';
import type { SettingEditor, SettingEditorState } from '../model/setting-editor';
import { findShellFault } from '../model/shell-densities';
import { AxisSection } from './axis-section';
import { DoubtSection } from './doubt-section';
import { FiguresSection } from './figures-section';
import { RunProgress } from './run-progress';
import { SaveStatus } from './save-status';
import { sectionNames, type SectionName } from './section';
import { SoundnessSection } from './soundness-section';
import { SourceSection } from './source-section';
import './part-grid.css';
import './statement.css';
import './examination.css';

interface PartStatementProps {
  part: Part;
  editor: SettingEditor;
  state: SettingEditorState;
  ownName: string;
  materials: readonly Material[];
  /** Opens the choice of another file; absent where the page has none. */
  onReplace?: () => void;
}

/** What can be done about a file that could not be measured. */
function FailedActions({ part, onReplace }: Pick<PartStatementProps, 'part' | 'onReplace'>) {
  const again = useMeasureAgain();
  return (
    <>
      <Button size="small" loading={again.isPending} onClick={() => again.mutate(part.id)}>
        Measure again
      </Button>
      {onReplace && (
        <Button size="small" onClick={onReplace}>
          Replace the file
        </Button>
      )}
      {again.error && <ProblemNotice error={again.error} />}
    </>
  );
}

/**
 * The statement of a part: what the worker measured, under the setting as the person has it now. Every change of the setting
 * is computed here with the same function that the server records with.
 */
export function PartStatement({ part, editor, state, ownName, materials, onReplace }: PartStatementProps) {
  const { revision, can } = part;
  const { measurement, fileName, sha256, run } = revision;
  const { draft } = state;
  const statement = useMemo(
    () => (measurement ? computeStatement(measurement, draft, { file: fileName, sha256: sha256 ?? '' }) : undefined),
    [measurement, draft, fileName, sha256],
  );
  const own = can.edit ? editor : undefined;
  const hasAxis = statement?.massKg !== null && statement !== undefined;
  const sections: SectionName[] = [
    sectionNames.source,
    ...(measurement ? [sectionNames.soundness, sectionNames.figures] : []),
    ...(hasAxis ? [sectionNames.axis] : []),
    ...(statement?.uncertainty ? [sectionNames.doubt] : []),
  ];
  return (
    <div className="statement-page">
      <aside className="statement-rail screen-only">
        <nav aria-label="Sections">
          <ol>
            {sections.map(({ number, id, title }) => (
              <li key={id}>
                <a href={`#${id}`}>
                  <span className="figure soft">{number}</span> {title}
                </a>
              </li>
            ))}
          </ol>
        </nav>
        {can.edit && <SaveStatus editor={editor} state={state} ownName={ownName} />}
      </aside>
      <article className="statement" aria-label="Statement">
        <SourceSection part={part} editor={editor} state={state} materials={materials} statement={statement} />
        {!measurement && (
          <div className="section section-run">
            <RunProgress run={run} actions={can.edit && <FailedActions part={part} onReplace={onReplace} />} />
          </div>
        )}
        {measurement && <SoundnessSection measurement={measurement} run={run} setting={draft} editor={own} />}
        {measurement && (
          <FiguresSection measurement={measurement} statement={statement} shellFault={findShellFault(measurement, draft)} isMixed={(draft.shellDensities ?? []).length > 0} editor={own} />
        )}
        {statement && hasAxis && <AxisSection statement={statement} canEdit={can.edit} editor={editor} state={state} />}
        {measurement && statement?.uncertainty && <DoubtSection statement={statement} setting={draft} measurement={measurement} />}
      </article>
    </div>
  );
}
