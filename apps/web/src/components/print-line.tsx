import { useEffect, useState, type ReactNode } from 'react';
import { flushSync } from 'react-dom';
import { formatMoment } from '../lib/format-time';

/** Stands on paper only: what the sheet is of, and when it was printed. */
export function PrintLine({ children }: { children: ReactNode }) {
  const [printedAt, setPrintedAt] = useState(() => new Date().toISOString());
  useEffect(() => {
    // The browser lays the sheet out right after this event, so the page must have changed by then.
    const note = (): void => flushSync(() => setPrintedAt(new Date().toISOString()));
    addEventListener('beforeprint', note);
    return () => removeEventListener('beforeprint', note);
  }, []);
  return (
    <p className="print-only print-line">
      {children}, printed {formatMoment(printedAt)}
    </p>
  );
}
