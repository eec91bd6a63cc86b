import type { ReactNode } from 'react';

/** A paragraph that must not be overlooked: doubt, something wrong, or an agreement. */
export function Notice({ tone, children, live = false }: { tone: 'doubt' | 'wrong' | 'agreement' | 'plain'; children: ReactNode; live?: boolean }) {
  return (
    <div className={`notice notice-${tone}`} role={live ? (tone === 'wrong' ? 'alert' : 'status') : undefined}>
      {children}
    </div>
  );
}
