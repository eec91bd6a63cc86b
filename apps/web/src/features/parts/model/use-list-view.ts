import { useCallback, useMemo, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import { isStandard } from './columns';
import { readAddress, writeAddress, type ListView } from './list-address';
import { readRememberedColumns, rememberColumns } from './remembered-columns';

/** What the list shows, as the address says it; a change is a new address, so that back and forward go through what was seen. */
export function useListView(): { view: ListView; change: (change: Partial<ListView>) => void } {
  const [parameters, setParameters] = useSearchParams();
  const [remembered, setRemembered] = useState(readRememberedColumns);
  const view = useMemo(() => readAddress(parameters, remembered), [parameters, remembered]);
  const change = useCallback(
    (wanted: Partial<ListView>) => {
      if (wanted.columns) {
        rememberColumns(wanted.columns);
        setRemembered(isStandard(wanted.columns) ? undefined : wanted.columns);
      }
      const next = { ...view, ...wanted };
      // Letters of one search are one step back, not ten.
      const isTyping = Object.keys(wanted).join() === 'text' && view.text !== '' && next.text !== '';
      setParameters(writeAddress(next), { replace: isTyping || wanted.columns !== undefined, preventScrollReset: true });
    },
    [view, setParameters],
  );
  return { view, change };
}

