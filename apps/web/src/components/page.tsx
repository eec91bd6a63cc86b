import { createContext, useContext, type ReactNode } from 'react';
import { createPortal } from 'react-dom';
import { Link } from 'react-router-dom';

export interface Crumb {
  label: string;
  to?: string;
}

/** Where the shell keeps the place for a page's breadcrumb. */
export const CrumbPlace = createContext<HTMLElement | null>(null);

export function Crumbs({ crumbs }: { crumbs: readonly Crumb[] }) {
  const place = useContext(CrumbPlace);
  if (!place) return null;
  return createPortal(
    <ol className="crumbs">
      {crumbs.map((crumb, index) => (
        <li key={`${index} ${crumb.label}`} title={crumb.label.length > 30 ? crumb.label : undefined} aria-current={index === crumbs.length - 1 ? 'page' : undefined}>
          {crumb.to ? <Link to={crumb.to}>{crumb.label}</Link> : <span>{crumb.label}</span>}
        </li>
      ))}
    </ol>,
    place,
  );
}

interface PageHeadingProps {
  title: string;
  /** The text of the browser's tab where it should differ from the heading. */
  documentTitle?: string;
  above?: ReactNode;
  beside?: ReactNode;
  actions?: ReactNode;
}

/** The head of a page: its name, what stands beside it, and what can be done. */
export function PageHeading({ title, documentTitle, above, beside, actions }: PageHeadingProps) {
  return (
    <header className="page-heading">
      <title>{`${documentTitle ?? title} – Masswright`}</title>
      <div className="page-heading-words">
        {above && <p className="page-heading-above">{above}</p>}
        <div className="page-heading-line">
          <h1>{title}</h1>
          {beside}
        </div>
      </div>
      {actions && <div className="page-heading-actions screen-only">{actions}</div>}
    </header>
  );
}
