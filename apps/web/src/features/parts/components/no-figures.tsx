import { Button } from '@blueprintjs/core';
import type { Soundness, StatementRecord } from '@masswright/contracts';
import { Notice } from '../../../components/notice';
import { findRefusal } from '../model/refusal-words';
import type { SettingEditor } from '../model/setting-editor';
import { sectionNames } from './section';

interface NoFiguresProps {
  soundness: Soundness;
  statement: StatementRecord | undefined;
  /** Why the densities of shells can't be taken into account. */
  shellFault: string | undefined;
  /** Undefined where the reader may change nothing. */
  editor: SettingEditor | undefined;
}

/** Why there are no figures: the mesh has no inside, or something is not stated yet. */
export function NoFigures({ soundness, statement, shellFault, editor }: NoFiguresProps) {
  const refusal = findRefusal(soundness);
  if (refusal) {
    return (
      <Notice tone="wrong">
        <p>
          <b>No figures.</b> {refusal.why}
        </p>
        <p>{refusal.remedy}</p>
      </Notice>
    );
  }
  if (statement !== undefined && shellFault !== undefined) return <ShellFault fault={shellFault} editor={editor} />;
  if (statement !== undefined && statement.densityKgM3 !== null) return <ShellFault fault="What is left of the part weighs nothing, or less." editor={editor} />;
  const missing = statement === undefined ? 'unit' : 'density';
  return (
    <Notice tone="doubt">
      <p>
        <b>{statement === undefined ? 'No figures yet.' : 'No mass yet.'}</b>{' '}
        {missing === 'unit' ? 'Nobody has stated the unit, and none is assumed: a wrong one would be wrong by its cube.' : 'Mass and inertia need the density of the part.'}{' '}
        {editor ? <a href={`#${sectionNames.source.id}`}>State the {missing} in section 1.</a> : `The ${missing} is not stated.`}
      </p>
    </Notice>
  );
}

function ShellFault({ fault, editor }: { fault: string; editor: SettingEditor | undefined }) {
  return (
    <Notice tone="doubt">
      <p>
        <b>No mass.</b> {fault}
      </p>
      {editor && (
        <div className="notice-actions screen-only">
          <Button size="small" onClick={() => editor.change({ shellDensities: [] })}>
            Give all shells the part’s density
          </Button>
        </div>
      )}
    </Notice>
  );
}
