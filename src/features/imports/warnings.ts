import type { Shape } from '@/features/network';
import type { Assembled } from './assemble';
import type { AttributeColumn } from './attributes';
import type { ImportCounts, ImportWarning } from './imports';
import { dateOrderOf } from './numbers';

export interface WarningInput {
  readonly assembled: Pick<Assembled, 'ids' | 'attributes'>;
  readonly counts: Pick<ImportCounts, 'tieRows' | 'memberRows' | 'membersFromTies'>;
  /** Members of the members file that have a tie. */
  readonly namedWithTie: number;
  readonly shape: Pick<Shape, 'components' | 'largestComponent'>;
  readonly spaced: number;
  readonly notes: readonly string[];
}

const percent = (share: number): string => `${Math.round(share * 100)} %`;
const number = (value: number): string => value.toLocaleString('en-GB');

/** What about one attribute could mislead an analysis. */
function attributeWarnings(one: AttributeColumn): ImportWarning[] {
  const found: ImportWarning[] = [];
  const add = (code: string, text: string): void => void found.push({ code, text: `“${one.name}” ${text}` });
  const total = one.labels ? one.labels.length : one.values.length;
  const filled: (string | number)[] = one.labels
    ? one.labels.filter((label) => label !== null)
    : [...one.values].filter((value) => !Number.isNaN(value));
  const distinct = new Set(filled).size;
  if (filled.length < total * 0.6)
    add('many-blank', `is blank for ${percent(1 - filled.length / total)} of the members.`);
  if (one.labels && dateOrderOf(filled.slice(0, 500) as string[]) !== null)
    add(
      'looks-like-date',
      'holds dates, kept as labels. Load it as a date to have months until this snapshot.',
    );
  else if (
    filled.length > 20 &&
    distinct > filled.length * 0.9 &&
    (one.labels || looksLikeId(filled as number[]))
  )
    add('looks-like-id', 'is different for almost everyone; it looks like an id or free text.');
  if (distinct === 1 && filled.length > 1)
    add('constant', 'is the same for everyone, so nothing can be read from it.');
  return found;
}

/** Whole numbers, each once, that count through or are very large. */
function looksLikeId(values: readonly number[]): boolean {
  if (!values.every(Number.isInteger) || new Set(values).size < values.length) return false;
  let least = Infinity;
  let most = -Infinity;
  for (const value of values) {
    least = Math.min(least, value);
    most = Math.max(most, value);
  }
  return most - least < values.length * 1.2 || least > 1e6;
}

/** What a person should know before trusting an analysis of this snapshot; nothing here stops the import. */
export function warningsFor(input: WarningInput): ImportWarning[] {
  const { assembled, counts, namedWithTie, shape, spaced, notes } = input;
  const { tieRows, memberRows, membersFromTies } = counts;
  const { ids } = assembled;
  const warnings: ImportWarning[] = notes.map((text) => ({ code: 'note', text }));
  const add = (code: string, text: string): void => void warnings.push({ code, text });
  const inFile = memberRows.kept + memberRows.leftOut;
  if (inFile > 0 && namedWithTie === 0)
    add(
      'nobody-named',
      'The members file names nobody who stands in the ties file. Check that both use the same ids.',
    );
  else if (namedWithTie < inFile * 0.5)
    add(
      'few-named',
      `Only ${number(namedWithTie)} of ${number(inFile)} members in the members file have a tie.`,
    );
  if (inFile > 0 && membersFromTies > ids.length * 0.2)
    add(
      'many-from-ties',
      `${percent(membersFromTies / ids.length)} of the members stand in the ties file only and have no attributes.`,
    );
  if (spaced > 0) add('spaces', `${number(spaced)} ids had spaces around them; they were read without.`);
  const folded = new Set(ids.map((id) => id.toLowerCase()));
  if (folded.size < ids.length)
    add(
      'case',
      `${number(ids.length - folded.size)} ids differ from another only in capital letters. They were kept apart.`,
    );
  if (tieRows.merged > tieRows.read * 0.5)
    add(
      'many-repeats',
      `${percent(tieRows.merged / tieRows.read)} of the tie rows repeat a tie of another row. Check how repeats add up.`,
    );
  if (tieRows.refused > tieRows.read * 0.1)
    add('many-refused', `${percent(tieRows.refused / tieRows.read)} of the tie rows were refused.`);
  if (shape.components > 1 && shape.largestComponent < ids.length * 0.8)
    add(
      'parts',
      `The community falls into ${number(shape.components)} parts; the largest holds ${percent(shape.largestComponent / ids.length)} of the members.`,
    );
  return [...warnings, ...assembled.attributes.flatMap(attributeWarnings)];
}
