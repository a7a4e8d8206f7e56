import type { ReactNode } from 'react';
import { Banner } from './Banner';
import { Beam } from './Beam';
import { ProgressBar } from './ProgressBar';

export interface StateProps {
  /** What happened, in one sentence. */
  title: ReactNode;
  /** What it means. */
  children?: ReactNode;
  /** One next step first. */
  actions?: ReactNode;
  level?: 2 | 3;
}

/** Nothing is here. `picture`: `beam` (nothing was loaded yet), `settled` (all done), or none. */
export function EmptyState({
  picture,
  title,
  children,
  actions,
  level = 2,
}: StateProps & { picture?: 'beam' | 'settled' }) {
  const Heading = level === 2 ? 'h2' : 'h3';
  return (
    <div className="state">
      {picture === 'beam' && <Beam />}
      {picture === 'settled' && (
        <svg width="120" height="22" aria-hidden="true">
          <path d="M2 11h116" stroke="var(--c-moss)" strokeWidth="2.5" strokeDasharray="6 5" />
        </svg>
      )}
      <Heading>{title}</Heading>
      {children && <p>{children}</p>}
      {actions && <div className="row">{actions}</div>}
    </div>
  );
}

export interface LoadingStateProps extends Omit<StateProps, 'actions'> {
  /** 0…1 when it is known; only true values, never a guess. */
  progress?: number;
  onStop?: () => void;
}

/** Work in progress: the beam fills with threads as it goes. */
export function LoadingState({ title, children, progress, onStop, level = 2 }: LoadingStateProps) {
  const Heading = level === 2 ? 'h2' : 'h3';
  return (
    <div className="state" aria-busy="true">
      <Beam progress={progress ?? 0} />
      <Heading>{title}</Heading>
      {children && <p>{children}</p>}
      <ProgressBar
        label={typeof title === 'string' ? title : 'Progress'}
        value={progress ?? null}
        onStop={onStop}
      />
    </div>
  );
}

export interface ErrorStateProps extends StateProps {
  /** The rest of the sentence in the banner, not bold. */
  detail?: ReactNode;
}

/** It did not work: what happened in the banner, what it means, what to do. */
export function ErrorState({ title, detail, children, actions }: ErrorStateProps) {
  return (
    <div className="state">
      <div style={{ alignSelf: 'stretch' }}>
        <Banner tone="error" title={title}>
          {detail}
        </Banner>
      </div>
      {children && <p>{children}</p>}
      {actions && <div className="row">{actions}</div>}
    </div>
  );
}
