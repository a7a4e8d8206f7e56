/** One message about one part of bad input; `path` is dotted, as in `options.ties.source`. */
export interface FieldError {
  readonly path: string;
  readonly message: string;
}

/** The RFC 9457 problem document that every failed request and job carries. */
export interface ProblemDocument {
  readonly type: string;
  readonly title: string;
  readonly status: number;
  readonly detail: string;
  readonly errors?: readonly FieldError[];
}

/**
 * An error meant for the person who caused it. `code` belongs to the feature that throws it,
 * `detail` says what happened and what to do next. Never put SQL, stack or paths in it.
 */
export class ProblemError extends Error {
  override readonly name = 'ProblemError';
  constructor(
    readonly status: number,
    readonly code: string,
    readonly title: string,
    readonly detail: string,
    readonly errors?: readonly FieldError[],
    readonly headers?: Readonly<Record<string, string>>,
  ) {
    super(`${title} ${detail}`);
  }

  toDocument(): ProblemDocument {
    return {
      type: `urn:thrum:problem:${this.code}`,
      title: this.title,
      status: this.status,
      detail: this.detail,
      ...(this.errors ? { errors: this.errors } : {}),
    };
  }
}

export const notFound = (): ProblemError =>
  new ProblemError(404, 'not-found', 'Not found.', 'There is nothing here, or it is not yours to see.');

export const notSignedIn = (): ProblemError =>
  new ProblemError(401, 'not-signed-in', 'Please sign in.', 'This needs a session or an API token.');

export const forbidden = (detail = 'Your role in this workspace does not allow this.'): ProblemError =>
  new ProblemError(403, 'forbidden', 'Not allowed.', detail);

export const conflict = (code: string, detail: string): ProblemError =>
  new ProblemError(409, code, 'Somebody was faster.', detail);

export const unprocessable = (code: string, detail: string, errors?: readonly FieldError[]): ProblemError =>
  new ProblemError(422, code, 'This cannot be done as asked.', detail, errors);
