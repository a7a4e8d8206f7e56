import { formatCount, formatPercent } from '@/lib/format';

export interface BriefFacts {
  readonly members: number;
  readonly ties: number;
  readonly components: number;
  readonly largestComponent: number;
  /**
   * The group that keeps to itself most, with its cut over its volume: of the contact that its members have, the
   * share that leaves the group. Null without a grouping.
   */
  readonly weakest: { readonly name: string; readonly leaving: number } | null;
  /** Attribute whose variation is shared most, with the share; null without a reading. */
  readonly mostShared: { readonly attribute: string; readonly explained: number } | null;
}

/** The one idea of the page. Never says more than the numbers do. */
export function headline({ weakest, mostShared, components }: BriefFacts): string {
  if (weakest && weakest.leaving < 0.1) return `Thinnest at the edge of ${weakest.name}.`;
  if (weakest) return 'Groups that reach into one another.';
  if (mostShared && mostShared.explained >= 0.3) return `${mostShared.attribute} runs along ties.`;
  return components > 1 ? 'A community in parts.' : 'One community, not yet read.';
}

/** The lead: size and shape, the weakest seam, what is shared; or what to do first. */
export function lead(facts: BriefFacts): string[] {
  const { members, ties, components, largestComponent, weakest, mostShared } = facts;
  const sentences = [`${formatCount(members, 'member')} and ${formatCount(ties, 'tie')}.`];
  if (components > 1)
    sentences.push(
      `${formatPercent(largestComponent / members)} of the members are joined; the rest stand in ${formatCount(components - 1, 'smaller part')}.`,
    );
  sentences.push(
    weakest
      ? `Of the contact that members of ${weakest.name} have, ${formatPercent(1 - weakest.leaving)} stays inside the group.`
      : 'No grouping has been made yet, so nothing can be said about where it could come apart.',
  );
  if (!mostShared) sentences.push('No reading has been taken yet.');
  else if (mostShared.explained < 0.05)
    sentences.push('In none of the attributes read so far do neighbours resemble each other much.');
  else
    sentences.push(
      `Neighbours predict ${formatPercent(mostShared.explained)} of the differences in ${mostShared.attribute}, more than in any other attribute read so far.`,
    );
  return sentences;
}
