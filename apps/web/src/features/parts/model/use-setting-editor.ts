import type { Part } from '@masswright/contracts';
import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { useStore } from '../../../lib/store';
import { getSentence, isProblem } from '../../../lib/problem';
import { changeSetting, keepPart, partKey, readPart } from '../api/parts';
import { createSettingEditor, type SettingEditor, type SettingEditorState } from './setting-editor';

/** The keys by which people everywhere take back their last change; within a text field they belong to the text. */
function isUndoKey(event: KeyboardEvent): boolean {
  const inText = event.target instanceof HTMLInputElement && !['radio', 'checkbox'].includes(event.target.type);
  return (event.ctrlKey || event.metaKey) && !event.shiftKey && !event.altKey && event.key.toLowerCase() === 'z' && !inText;
}

/** The editor of one part's setting, for as long as its page is open. */
export function useSettingEditor(part: Part): { editor: SettingEditor; state: SettingEditorState } {
  const client = useQueryClient();
  const [editor] = useState(() =>
    createSettingEditor(part.revision.setting, {
      save: async (request) => {
        const changed = await changeSetting(part.id, request);
        keepPart(client, changed);
        return changed.revision.setting;
      },
      reload: async () => {
        const now = await client.fetchQuery({ queryKey: partKey(part.id), queryFn: () => readPart(part.id), staleTime: 0 });
        return now.revision.setting;
      },
      isStale: (error) => isProblem(error, 'stale-version'),
      describe: getSentence,
    }),
  );
  const stored = part.revision.setting;
  useEffect(() => editor.adopt(stored), [editor, stored]);
  useEffect(() => {
    const undo = (event: KeyboardEvent): void => {
      if (!isUndoKey(event) || !editor.get().canUndo) return;
      event.preventDefault();
      editor.undo();
    };
    document.addEventListener('keydown', undo);
    addEventListener('pagehide', editor.flush);
    return () => {
      document.removeEventListener('keydown', undo);
      removeEventListener('pagehide', editor.flush);
      editor.flush();
    };
  }, [editor]);
  return { editor, state: useStore(editor) };
}
