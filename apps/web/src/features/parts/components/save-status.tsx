import { Button } from '@blueprintjs/core';
import { StatusTag } from '../../../components/status-tag';
import type { SettingEditor, SettingEditorState } from '../model/setting-editor';

interface SaveStatusProps {
  editor: SettingEditor;
  state: SettingEditorState;
  /** Who reads this: people are first themselves, too, in another window. */
  ownName: string;
}

/** Whether what is shown is also what is recorded, and the way back. */
export function SaveStatus({ editor, state, ownName }: SaveStatusProps) {
  const { status, problem, saved, mine } = state;
  return (
    <div className="save-status">
      <div role="status">
        {status === 'saved' && (
          <StatusTag tone="agreement" plain>
            Saved
          </StatusTag>
        )}
        {(status === 'waiting' || status === 'saving') && (
          <StatusTag tone="busy" plain>
            Saving
          </StatusTag>
        )}
        {status === 'failed' && (
          <>
            <StatusTag tone="wrong" plain>
              Not saved
            </StatusTag>
            <p>{problem}</p>
          </>
        )}
        {status === 'overtaken' && (
          <>
            <StatusTag tone="doubt" plain>
              Changed meanwhile
            </StatusTag>
            <p>
              {saved.changedBy === ownName
                ? 'You changed it in another window. What you see now is from there.'
                : `${saved.changedBy} changed the setting while you did. What you see now is theirs.`}
            </p>
          </>
        )}
      </div>
      {status === 'failed' && (
        <Button size="small" onClick={editor.retry}>
          Save again
        </Button>
      )}
      {mine && (
        <Button size="small" onClick={editor.putMineBack}>
          Put mine back
        </Button>
      )}
      {state.canUndo && (
        <Button size="small" variant="minimal" onClick={editor.undo}>
          Undo <kbd>Ctrl Z</kbd>
        </Button>
      )}
      {state.canRedo && (
        <Button size="small" variant="minimal" onClick={editor.redo}>
          Do again <kbd>Ctrl Shift Z</kbd>
        </Button>
      )}
    </div>
  );
}
