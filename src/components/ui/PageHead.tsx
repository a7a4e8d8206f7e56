import type { ReactNode } from 'react';

export interface PageHeadProps {
  title: ReactNode;
  /** Small line over the title: a way back, who made it, a state. */
  eyebrow?: ReactNode;
  /** Muted words after the title. */
  sub?: ReactNode;
  /** Buttons at the end; one primary. */
  actions?: ReactNode;
}

/** Title of a page with its buttons. */
export function PageHead({ title, eyebrow, sub, actions }: PageHeadProps) {
  return (
    <div className="phead">
      <div>
        {eyebrow && <div className="eyebrow">{eyebrow}</div>}
        <h1 className="h1">{title}</h1>
        {sub && <p className="mut">{sub}</p>}
      </div>
      {actions && <div className="acts">{actions}</div>}
    </div>
  );
}
