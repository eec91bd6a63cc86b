import type { ReactNode } from 'react';

/** A whole page that only says something: not found, forbidden, failed. */
export function MessagePage({ title, children, actions }: { title: string; children: ReactNode; actions?: ReactNode }) {
  return (
    <section className="message-page">
      <title>{`${title} – Masswright`}</title>
      <svg viewBox="0 0 120 56" width="120" height="56" aria-hidden="true" focusable="false">
        <path d="M8 30 112 12" stroke="currentColor" strokeWidth="4" />
        <path d="M60 23 72 46H48Z" className="word-mark-fulcrum" />
      </svg>
      <h1>{title}</h1>
      <div className="message-page-words">{children}</div>
      {actions && <div className="message-page-actions">{actions}</div>}
    </section>
  );
}
