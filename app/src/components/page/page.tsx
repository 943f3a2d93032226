import { type ReactNode, useId } from 'react';

/** The page's own padding and greatest width; a page head and its columns stand in it. */
export function Page({ children }: { children: ReactNode }) {
  return <div className="bl-page">{children}</div>;
}

/** Left what was measured; right, behind the double rule, what it means and where it is from. */
export function Columns({ children, margin }: { children: ReactNode; margin: ReactNode }) {
  return (
    <div className="bl-columns">
      <div>{children}</div>
      <aside className="bl-margin" aria-label="Margin">
        {margin}
      </aside>
    </div>
  );
}

export function MarginBlock({ title, children }: { title: string; children: ReactNode }) {
  const id = useId();
  return (
    <section className="bl-margin-block" aria-labelledby={id}>
      <h2 id={id}>{title}</h2>
      {children}
    </section>
  );
}

export interface SectionProps {
  title: string;
  /** Conditions in a few words beside the title. */
  sub?: ReactNode;
  tools?: ReactNode;
  children: ReactNode;
}

/** A part of the main column under a section rule. */
export function Section({ title, sub, tools, children }: SectionProps) {
  const id = useId();
  return (
    <section className="bl-section" aria-labelledby={id}>
      <div className="bl-section-head">
        <h2 id={id}>{title}</h2>
        {sub && <p>{sub}</p>}
        {tools && <div className="bl-section-tools">{tools}</div>}
      </div>
      {children}
    </section>
  );
}

export interface Fact {
  term: string;
  detail: ReactNode;
}

/** Facts of the margin: term in second ink, detail beside it. */
export function Facts({ facts }: { facts: readonly Fact[] }) {
  return (
    <dl className="bl-facts">
      {facts.map(({ term, detail }) => (
        <div key={term}>
          <dt>{term}</dt>
          <dd>{detail}</dd>
        </div>
      ))}
    </dl>
  );
}

export interface WarningBlockProps {
  tone?: 'caution' | 'fault';
  /** The first words, bold: what is the matter. */
  lead: string;
  /** The reason. */
  children?: ReactNode;
  /** A link or a word button: what can be done. */
  wayOut?: ReactNode;
}

/** A warning: double rule, bold first words, reason, way out. Never told by colour alone. */
export function WarningBlock({ tone = 'caution', lead, children, wayOut }: WarningBlockProps) {
  return (
    <div className={`bl-warning bl-warning-${tone}`}>
      <p>
        <strong>{lead}</strong> {children}
      </p>
      {wayOut && <span className="bl-warning-way-out">{wayOut}</span>}
    </div>
  );
}
