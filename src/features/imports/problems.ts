import { FIXED_LIMITS, type ImportProblem, type ProblemKind } from './imports';

const SHOWN = 200;
/** Kinds told apart; further ones are counted with the last. */
const MOST_KINDS = 200;

/** Gathers refused rows and cells: all are counted, the first hundred thousand are kept. */
export class Problems {
  readonly kept: (ImportProblem & { kind: number })[] = [];
  readonly kinds: ProblemKind[] = [];
  total = 0;
  private readonly kindOf = new Map<string, ProblemKind>();

  add(
    file: ImportProblem['file'],
    line: number,
    column: string | null,
    value: string | null,
    reason: string,
  ): void {
    this.total++;
    const kind = this.kind(file, column, reason, line);
    kind.count++;
    if (this.kept.length >= FIXED_LIMITS.problems) return;
    const shown = value !== null && value.length > SHOWN ? `${value.slice(0, SHOWN)}…` : value;
    this.kept.push({
      file,
      line,
      column,
      value: shown === null ? null : storable(shown),
      reason,
      kind: kind.kind,
    });
  }

  private kind(
    file: ImportProblem['file'],
    column: string | null,
    reason: string,
    line: number,
  ): ProblemKind {
    // Numbers in a reason, as of cells in a row, do not make another kind.
    const key = `${file}|${column ?? ''}|${reason.replaceAll(/\d+/g, '#')}`;
    const known = this.kindOf.get(key);
    if (known) return known;
    if (this.kinds.length >= MOST_KINDS) return this.kinds.at(-1)!;
    const made = { kind: this.kinds.length, file, column, reason, count: 0, firstLine: line };
    this.kinds.push(made);
    this.kindOf.set(key, made);
    return made;
  }
}

/** Text that the database keeps: no NUL, no half of a surrogate pair. */
export const storable = (text: string): string => text.replaceAll('\0', '␀').toWellFormed();
