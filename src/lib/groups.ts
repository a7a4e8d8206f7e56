/** Letters and colours of groups: A to J, then AA to JJ, AAA …; colours repeat every ten. */

const LETTERS = 'ABCDEFGHIJ';

/** 0 → "A", 9 → "J", 10 → "AA", 20 → "AAA". */
export function groupLetter(index: number): string {
  if (!Number.isInteger(index) || index < 0)
    throw new RangeError(`Group index must be 0 or more, got ${index}`);
  return LETTERS.charAt(index % 10).repeat(Math.floor(index / 10) + 1);
}

/** "A" → 0, "AA" → 10; null for anything that is not a group letter. */
export function groupIndex(letter: string): number | null {
  const first = letter.charAt(0).toUpperCase();
  const place = LETTERS.indexOf(first);
  if (!first || place < 0 || letter.toUpperCase() !== first.repeat(letter.length)) return null;
  return place + 10 * (letter.length - 1);
}

/** CSS variable names of a group's fill and of the ink on it; `null` for letters outside A to J. */
export function groupColour(letter: string): { fill: string; ink: string } | null {
  if (groupIndex(letter) === null) return null;
  const key = letter.charAt(0).toLowerCase();
  return { fill: `--g-${key}`, ink: `--gi-${key}` };
}
