/**
 * A member network as a symmetric sparse matrix W in compressed sparse rows: non-negative, finite,
 * zero diagonal, columns sorted within a row, every tie stored in both directions.
 * Built and checked by `buildNetwork`; never mutated afterwards.
 */
export interface Network {
  /** Number of members. */
  readonly n: number;
  /** Row starts, length n + 1. */
  readonly offsets: Int32Array;
  /** Neighbour of each stored entry, length 2m. */
  readonly targets: Int32Array;
  /** Weight of each stored entry, length 2m. */
  readonly weights: Float64Array;
  /** Strength d_i = Σ_j w_ij, length n. */
  readonly strength: Float64Array;
}

export type LaplacianKind = 'combinatorial' | 'normalised' | 'regularised';

/** What a long computation may be handed: both are optional and never change a result. */
export interface Watch {
  /** Called now and then with the share done, 0…1, and what is being done in plain words. */
  readonly progress?: (done: number, step: string) => void;
  /** Asked now and then; when it answers true the computation throws `CancelledError`. */
  readonly cancelled?: () => boolean;
}

/** A condition on the input that a method needs and that failed; `message` says it in plain words. */
export class UnanswerableError extends Error {
  override readonly name = 'UnanswerableError';
  constructor(
    /** Stable code for callers, such as `no-ties` or `constant-attribute`. */
    readonly code: string,
    message: string,
  ) {
    super(message);
  }
}

/** An iteration reached its ceiling without the promised accuracy. */
export class NotConvergedError extends Error {
  override readonly name = 'NotConvergedError';
  constructor(
    message: string,
    readonly residual: number,
  ) {
    super(message);
  }
}

/** The caller asked the computation to stop. */
export class CancelledError extends Error {
  override readonly name = 'CancelledError';
  constructor() {
    super('Stopped on request.');
  }
}
