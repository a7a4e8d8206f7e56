import type { RowSink } from '@/features/files';
import { cellsThatFit } from './cells';
import { importErrors } from './errors';
import { guessMappingColumns } from './guess';
import type { ImportLimits, ImportOptions } from './imports';
import { normaliseId, whyNotId } from './numbers';
import type { Problems } from './problems';

/** Takes the rows of a file of changed ids: what a member was called before, and is called now. */
export class MappingReader implements RowSink {
  read = 0;
  refused = 0;
  /** Former ids by present ones. */
  readonly formerOf = new Map<string, string>();
  private readonly presentOf = new Map<string, string>();
  private headers: string[] = [];
  private at = { old: -1, new: -1 };

  constructor(
    private readonly options: ImportOptions,
    private readonly problems: Problems,
    private readonly limits: ImportLimits,
  ) {}

  get kept(): number {
    return this.formerOf.size;
  }

  /** The present id of a member by a former one; the same where it did not change. */
  present(former: string): string {
    return this.presentOf.get(former) ?? former;
  }

  /**
   * The changes that hold for these members: the former id is nobody's any more, and the present one was nobody's
   * before, unless that member's id changed too.
   * @param before ids that are known from earlier
   */
  holding(ids: Iterable<string>, before: ReadonlySet<string>): Map<string, string> {
    const now = new Set(ids);
    const holds = new Map<string, string>();
    for (const [present, former] of this.formerOf) {
      const stillThere = now.has(former) && !this.formerOf.has(former);
      const wasTaken = before.has(present) && !this.presentOf.has(present);
      if (!stillThere && !wasTaken) holds.set(present, former);
    }
    return holds;
  }

  header(headers: string[]): void {
    this.headers = headers;
    const guess = guessMappingColumns(headers);
    const index = (key: 'old' | 'new'): number => {
      const column = this.options.mapping[key] ?? guess[key];
      const at = column === undefined ? -1 : headers.indexOf(column);
      if (at < 0) throw importErrors.noColumn('mapping', `the ${key} id`, headers);
      return at;
    };
    this.at = { old: index('old'), new: index('new') };
  }

  broken(line: number, value: string, reason: string): void {
    this.count();
    this.refused++;
    this.problems.add('mapping', line, null, value, reason);
  }

  private count(): void {
    if (++this.read > this.limits.memberRows)
      throw importErrors.tooManyRows('mapping', this.limits.memberRows);
  }

  row(given: string[], line: number): void {
    const cells = cellsThatFit(given, this.headers.length);
    if (typeof cells === 'string') return this.broken(line, given.join(' | '), cells);
    this.count();
    const refuse = (at: number, reason: string): void => {
      this.refused++;
      this.problems.add('mapping', line, this.headers[at]!, cells[at]!, reason);
    };
    const former = normaliseId(cells[this.at.old]!);
    const present = normaliseId(cells[this.at.new]!);
    const formerWrong = whyNotId(former, this.limits.idLength);
    if (formerWrong) return refuse(this.at.old, formerWrong);
    const presentWrong = whyNotId(present, this.limits.idLength);
    if (presentWrong) return refuse(this.at.new, presentWrong);
    if (former === present) return refuse(this.at.new, 'Both ids are the same.');
    if (this.presentOf.has(former))
      return refuse(this.at.old, 'This id was changed in an earlier row already.');
    if (this.formerOf.has(present))
      return refuse(this.at.new, 'Another member was given this id in an earlier row.');
    this.presentOf.set(former, present);
    this.formerOf.set(present, former);
  }
}
