import { useEffect, useState } from 'react';
import { flushSync } from 'react-dom';

/** True from the moment that the browser lays out a sheet until it is done with it. */
export function useIsPrinting(): boolean {
  const [isPrinting, setIsPrinting] = useState(false);
  useEffect(() => {
    // The sheet is laid out right after the event, so the page must have changed by then.
    const begin = (): void => flushSync(() => setIsPrinting(true));
    const end = (): void => setIsPrinting(false);
    addEventListener('beforeprint', begin);
    addEventListener('afterprint', end);
    return () => {
      removeEventListener('beforeprint', begin);
      removeEventListener('afterprint', end);
    };
  }, []);
  return isPrinting;
}
