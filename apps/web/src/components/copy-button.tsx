import { Button } from '@blueprintjs/core';
import { useEffect, useState } from 'react';

/** Copies a text and says so, for a moment, in its own words. */
export function CopyButton({ text, what }: { text: string; what: string }) {
  const [state, setState] = useState<'ready' | 'copied' | 'refused'>('ready');
  useEffect(() => {
    if (state === 'ready') return undefined;
    const timer = setTimeout(() => setState('ready'), 2000);
    return () => clearTimeout(timer);
  }, [state]);
  const copy = (): void => {
    // Missing on a plain-http page of another host.
    const clipboard: Clipboard | undefined = 'clipboard' in navigator ? navigator.clipboard : undefined;
    (clipboard ? clipboard.writeText(text) : Promise.reject(new Error('no clipboard'))).then(
      () => setState('copied'),
      () => setState('refused'),
    );
  };
  return (
    <>
      <Button size="small" variant="minimal" className="screen-only" aria-label={`Copy ${what}`} onClick={copy}>
        {state === 'copied' ? 'Copied' : 'Copy'}
      </Button>
      <span role="status" className={state === 'refused' ? 'soft' : 'hidden-visually'}>
        {state === 'copied' ? `${what} is copied.` : state === 'refused' ? 'The browser did not allow copying; select the text instead.' : ''}
      </span>
    </>
  );
}
