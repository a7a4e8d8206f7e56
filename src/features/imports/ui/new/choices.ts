import type { ImportOptions } from '../../imports';

/** How ties add up, and what the files are. */
export interface Choices {
  readonly takenOn: string;
  readonly label: string;
  readonly mode: ImportOptions['mode'];
  readonly directions: ImportOptions['directions'];
  readonly repeats: ImportOptions['repeats'];
  readonly logWeight: boolean;
  readonly halfLifeDays: number | null;
  readonly minimumWeight: number | null;
  readonly loners: ImportOptions['loners'];
}

export const usualChoices = (takenOn: string): Choices => ({
  takenOn,
  label: '',
  mode: 'full',
  directions: 'sum',
  repeats: 'sum',
  logWeight: false,
  halfLifeDays: null,
  minimumWeight: null,
  loners: 'keep',
});

/** Choices of an earlier import; day and label are this one's own. */
export const rememberedChoices = (options: ImportOptions, now: Choices): Choices => ({
  ...now,
  mode: now.mode,
  directions: options.directions,
  repeats: options.repeats,
  logWeight: options.logWeight,
  halfLifeDays: options.halfLifeDays,
  minimumWeight: options.minimumWeight,
  loners: options.loners,
});
