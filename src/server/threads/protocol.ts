/** A task is a pure function of its input; it may report progress and must ask now and then whether to stop. */
export type ThreadTask = (
  input: never,
  watch: { progress: (done: number, step: string) => void; cancelled: () => boolean },
) => unknown;

export interface ThreadRequest {
  readonly task: string;
  readonly input: unknown;
  /** One shared 32-bit flag; 1 means stop. */
  readonly stop: SharedArrayBuffer;
}

export type ThreadMessage =
  | { readonly kind: 'progress'; readonly done: number; readonly step: string }
  | { readonly kind: 'result'; readonly value: unknown }
  | { readonly kind: 'error'; readonly name: string; readonly code: string | null; readonly message: string };
