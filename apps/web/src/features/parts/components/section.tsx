import type { ReactNode } from 'react';

export interface SectionName {
  number: number;
  id: string;
  title: string;
}

/** The sections of a statement in reading order; the same order as on paper. */
export const sectionNames = {
  source: { number: 1, id: 'source', title: 'Source' },
  soundness: { number: 2, id: 'soundness', title: 'Soundness' },
  figures: { number: 3, id: 'figures', title: 'Figures' },
  axis: { number: 4, id: 'axis', title: 'Axis and torque' },
  doubt: { number: 5, id: 'doubt', title: 'Doubt' },
} as const satisfies Record<string, SectionName>;

export function Section({ name, aside, children }: { name: SectionName; aside?: ReactNode; children: ReactNode }) {
  return (
    <section id={name.id} className="section" aria-labelledby={`${name.id}-title`}>
      <span className="section-number figure" aria-hidden="true">
        {name.number}
      </span>
      <div className="section-body">
        <header className="section-head">
          <h2 id={`${name.id}-title`}>{name.title}</h2>
          {aside && <div className="section-aside">{aside}</div>}
        </header>
        {children}
      </div>
    </section>
  );
}

/** A row of a section: what it is, and what is so. */
export function Fact({ name, children }: { name: string; children: ReactNode }) {
  return (
    <div className="fact">
      <dt>{name}</dt>
      <dd>{children}</dd>
    </div>
  );
}
