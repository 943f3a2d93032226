import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';

export interface Crumb {
  label: string;
  /** Left out for the place itself, which is no link. */
  to?: string;
}

export interface PageHeadProps {
  title: string;
  /** After the title in second ink: a condition, the bench's name. */
  titleAside?: ReactNode;
  crumbs?: readonly Crumb[];
  sub?: ReactNode;
  actions?: ReactNode;
  /** The line; without one a rule divides head from page unless `hasDivider` is false. */
  line?: ReactNode;
  hasDivider?: boolean;
}

/** Where we are, the title, what can be done, the line. Sets the document's title too. */
export function PageHead({
  title,
  titleAside,
  crumbs = [],
  sub,
  actions,
  line,
  hasDivider = false,
}: PageHeadProps) {
  return (
    <header className="bl-page-head">
      <title>{`${title} · Benchlark`}</title>
      {crumbs.length > 0 && (
        <nav aria-label="Where this is" className="bl-crumbs-nav">
          <ol className="bl-crumbs">
            {crumbs.map(({ label, to }) => (
              <li key={label}>{to ? <Link to={to}>{label}</Link> : label}</li>
            ))}
          </ol>
        </nav>
      )}
      <h1 className="bl-page-title">
        {title}
        {titleAside && <small>{titleAside}</small>}
      </h1>
      {sub && <p className="bl-page-sub">{sub}</p>}
      {actions && <div className="bl-page-actions">{actions}</div>}
      {line && <div className="bl-page-line">{line}</div>}
      {hasDivider && !line && <div className="bl-page-divider" />}
    </header>
  );
}
