import type { ReadingFilter } from './filter';

/** Share of false flags among the flags that the interface speaks of; cases can be opened at another one. */
export const THRESHOLD = 0.1;

/** The filter in plain words. */
export function filterWords(filter: ReadingFilter): string {
  switch (filter.kind) {
    case 'two-level':
      return 'Group levels and ties';
    case 'tikhonov':
      if (filter.alpha === 'gcv') return 'Tikhonov, cross-validated';
      return filter.alpha === 'hold-out'
        ? 'Tikhonov, chosen on left-out scores'
        : `Tikhonov, strength ${filter.alpha}`;
    case 'heat':
      return `Heat kernel, time ${filter.tau}`;
    case 'band-pass':
      return `Band-pass, ${filter.from} to ${filter.to}`;
    default: {
      const name = filter.kind === 'low-pass' ? 'Low-pass' : 'High-pass';
      return 'keep' in filter ? `${name}, ${filter.keep} frequencies` : `${name}, cut at ${filter.cutoff}`;
    }
  }
}
