import type { ReactNode } from 'react';
import { cx } from './classes';

export interface CardProps {
  title?: ReactNode;
  /** Muted words or controls at the end of the head. */
  aside?: ReactNode;
  children: ReactNode;
  level?: 2 | 3 | 4;
  /** No padding around the content (tables). */
  flush?: boolean;
  /** Madder edge: the chosen one. */
  on?: boolean;
  className?: string;
  id?: string;
}

/** A sheet with an edge. With a title it is a section with a heading. */
export function Card({ title, aside, children, level = 2, flush, on, className, id }: CardProps) {
  const Heading = `h${level}` as const;
  const classes = cx('card', !flush && !title && 'p', on && 'on', className);
  if (!title)
    return (
      <div className={classes} id={id}>
        {children}
      </div>
    );
  return (
    <section className={classes} id={id}>
      <header>
        <Heading className="h3">{title}</Heading>
        {aside && <div className="small mut row">{aside}</div>}
      </header>
      {flush ? children : <div style={{ padding: '0 16px 14px' }}>{children}</div>}
    </section>
  );
}

/** A stitched line: madder for a seam, quiet to divide sections. */
export function Stitch({ seam = false }: { seam?: boolean }) {
  return <hr className={cx('seamline', !seam && 'q')} />;
}
