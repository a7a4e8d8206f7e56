import { LIMITS, type ImportProblem } from './imports';

const SHOWN = 200;

/** Gathers refused rows and cells: all are counted, the first hundred thousand are kept. */
export class Problems {
  readonly kept: ImportProblem[] = [];
  total = 0;

  add(
    file: ImportProblem['file'],
    line: number,
    column: string | null,
    value: string | null,
    reason: string,
  ): void {
    this.total++;
    if (this.kept.length >= LIMITS.problems) return;
    const shown = value !== null && value.length > SHOWN ? `${value.slice(0, SHOWN)}…` : value;
    this.kept.push({ file, line, column, value: shown?.replaceAll('\0', '␀') ?? null, reason });
  }
}
