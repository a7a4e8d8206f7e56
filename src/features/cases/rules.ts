import type { Decision } from './cases';

export interface Outcome {
  readonly state: 'open' | 'watching' | 'closed';
  /** Null while a second person has yet to agree. */
  readonly decision: Decision | null;
  readonly escalationBy: string | null;
  readonly event: 'decision' | 'escalation-proposed';
}

/**
 * What recording a decision leads to. Escalating is proposed by one person and takes effect when another one
 * decides the same; any other decision withdraws the proposal.
 */
export function outcomeOf(decision: Decision, by: string, proposedBy: string | null): Outcome {
  if (decision === 'escalate' && (proposedBy === null || proposedBy === by))
    return { state: 'open', decision: null, escalationBy: by, event: 'escalation-proposed' };
  return {
    state: decision === 'keep-watching' ? 'watching' : 'closed',
    decision,
    escalationBy: null,
    event: 'decision',
  };
}

/** Expected number of false flags among `count` members whose largest false-discovery rate is `threshold`. */
export const expectedFalse = (count: number, threshold: number): number => count * threshold;
