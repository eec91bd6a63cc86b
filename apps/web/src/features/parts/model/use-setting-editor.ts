import type { Part } from '@masswright/contracts';
import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { useStore } from '../../../lib/store';
import { getSentence, isProblem, isWorthAnotherTry } from '../../../lib/problem';
import { partKey } from '../api/keys';
import { changeSetting, keepPart, readPart } from '../api/parts';
import { createSettingEditor, type SettingEditor, type SettingEditorState } from './setting-editor';
import { findStep } from '../../../lib/undo-keys';

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
      isPassing: isWorthAnotherTry,
      describe: getSentence,
    }),
  );
  const stored = part.revision.setting;
  useEffect(() => editor.adopt(stored), [editor, stored]);
  useEffect(() => {
    const takeStep = (event: KeyboardEvent): void => {
      const step = findStep(event);
      if (!step) return;
      // Otherwise the browser would undo in a text field that was left long ago.
      event.preventDefault();
      editor[step]();
    };
    document.addEventListener('keydown', takeStep);
    addEventListener('pagehide', editor.flush);
    addEventListener('online', editor.retry);
    return () => {
      document.removeEventListener('keydown', takeStep);
      removeEventListener('pagehide', editor.flush);
      removeEventListener('online', editor.retry);
      editor.flush();
    };
  }, [editor]);
  const state = useStore(editor);
  const { isAtRisk } = state;
  useEffect(() => {
    if (!isAtRisk) return;
    const askBeforeLeaving = (event: BeforeUnloadEvent): void => event.preventDefault();
    addEventListener('beforeunload', askBeforeLeaving);
    return () => removeEventListener('beforeunload', askBeforeLeaving);
  }, [isAtRisk]);
  return { editor, state };
}
