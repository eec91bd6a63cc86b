import type { ReactNode } from 'react';

/** What a status means for its reader; the shape says the same as the colour. */
export type Tone = 'agreement' | 'doubt' | 'wrong' | 'neutral' | 'busy';

const shapes: Record<Tone, ReactNode> = {
  agreement: <circle cx="6" cy="6" r="3.6" fill="currentColor" />,
  doubt: (
    <>
      <circle cx="6" cy="6" r="4" fill="none" stroke="currentColor" strokeWidth="1.3" />
      <path d="M6 2a4 4 0 0 0 0 8Z" fill="currentColor" />
    </>
  ),
  wrong: <path d="M6 1.6 11 10.4H1Z" fill="currentColor" />,
  neutral: <path d="M2 6h8" stroke="currentColor" strokeWidth="1.6" />,
  busy: <path d="M2 6a4 4 0 1 1 4 4" fill="none" stroke="currentColor" strokeWidth="1.6" />,
};

export function StatusTag({ tone, children, plain = false }: { tone: Tone; children: ReactNode; plain?: boolean }) {
  return (
    <span className={`status-tag status-${tone}${plain ? ' status-plain' : ''}`}>
      <svg viewBox="0 0 12 12" width="11" height="11" aria-hidden="true" focusable="false">
        {shapes[tone]}
      </svg>
      <span>{children}</span>
    </span>
  );
}
