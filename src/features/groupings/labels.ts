/**
 * Numbers groups from 0 by falling size, islets after the groups that were cut, equal ones by their first member,
 * so that letters do not depend on how a method happens to number them. −1 (outside) stays −1.
 */
export function orderGroups(
  labels: Int32Array,
  islets: ReadonlySet<number>,
): { labels: Int32Array; islet: boolean[] } {
  const size = new Map<number, number>();
  const first = new Map<number, number>();
  labels.forEach((label, member) => {
    if (label < 0) return;
    size.set(label, (size.get(label) ?? 0) + 1);
    if (!first.has(label)) first.set(label, member);
  });
  const order = [...size.keys()].sort(
    (a, b) =>
      Number(islets.has(a)) - Number(islets.has(b)) ||
      size.get(b)! - size.get(a)! ||
      first.get(a)! - first.get(b)!,
  );
  const place = new Map(order.map((label, index) => [label, index]));
  return {
    labels: labels.map((label) => (label < 0 ? -1 : place.get(label)!)),
    islet: order.map((label) => islets.has(label)),
  };
}

/** Least share of a group's labelled members that its name must speak for. */
const AGREEMENT = 0.6;
/** Fewer labelled members than this say nothing about a group. */
const FEWEST = 3;

/**
 * Names for groups from one label attribute: a label that at least 60 % of a group's labelled members carry, and
 * that no other group is named by. Null where there is none.
 */
function namesFrom(labels: Int32Array, count: number, words: readonly (string | null)[]): (string | null)[] {
  const tallies = Array.from({ length: count }, () => new Map<string, number>());
  labels.forEach((group, member) => {
    const word = words[member];
    if (group < 0 || !word) return;
    const tally = tallies[group]!;
    tally.set(word, (tally.get(word) ?? 0) + 1);
  });
  const proposed = tallies.map((tally) => {
    let total = 0;
    let best: [string, number] = ['', 0];
    for (const entry of tally) {
      total += entry[1];
      if (entry[1] > best[1]) best = entry;
    }
    return total >= FEWEST && best[1] >= AGREEMENT * total ? best[0] : null;
  });
  return proposed.map((name) => (name && proposed.filter((one) => one === name).length === 1 ? name : null));
}

/** The proposals of the label attribute that names the most groups; the first one on ties. */
export function proposeNames(
  labels: Int32Array,
  count: number,
  attributes: readonly (readonly (string | null)[])[],
): (string | null)[] {
  let best: (string | null)[] = new Array<string | null>(count).fill(null);
  let most = 0;
  for (const words of attributes) {
    const names = namesFrom(labels, count, words);
    const named = names.filter(Boolean).length;
    if (named > most) [best, most] = [names, named];
  }
  return best;
}
