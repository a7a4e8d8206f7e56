import type { Network } from '../types';
import { describeGroups, groupCount } from './quality';

/**
 * Joins groups below the smallest size to the group they share most tie weight with, smallest first; a group
 * without ties to others stays. Numbers of vanished groups are not reused.
 */
export function mergeSmall(net: Network, labels: Int32Array, smallest: number): Int32Array {
  const { groups, between } = describeGroups(net, labels);
  const size = groups.map((group) => group.size);
  const ties = groups.map(() => new Map<number, number>());
  for (const { a, b, weight } of between) {
    if (a === b) continue;
    ties[a]!.set(b, weight);
    ties[b]!.set(a, weight);
  }
  const into = groups.map((group) => group.index);
  for (;;) {
    let least = -1;
    for (let g = 0; g < size.length; g++) {
      if (into[g] !== g || size[g]! >= smallest || size[g] === 0 || ties[g]!.size === 0) continue;
      if (least < 0 || size[g]! < size[least]!) least = g;
    }
    if (least < 0) break;
    const host = strongest(ties[least]!);
    into[least] = host;
    size[host]! += size[least]!;
    for (const [other, weight] of ties[least]!) {
      ties[other]!.delete(least);
      if (other === host) continue;
      ties[host]!.set(other, (ties[host]!.get(other) ?? 0) + weight);
      ties[other]!.set(host, ties[host]!.get(other)!);
    }
  }
  const root = (g: number): number => (into[g] === g ? g : root(into[g]!));
  return labels.map((label) => (label < 0 ? label : root(label)));
}

function strongest(ties: Map<number, number>): number {
  let best = -1;
  let most = -1;
  for (const [other, weight] of ties) {
    if (weight > most || (weight === most && other < best)) {
      most = weight;
      best = other;
    }
  }
  return best;
}

/** Numbers groups from 0, largest first (the one with the lowest member first on equal sizes); −1 stays. */
export function renumber(labels: Int32Array): Int32Array {
  const count = groupCount(labels);
  const size = new Int32Array(count);
  const first = new Int32Array(count).fill(labels.length);
  for (let i = labels.length - 1; i >= 0; i--) {
    const g = labels[i]!;
    if (g < 0) continue;
    size[g]!++;
    first[g] = i;
  }
  const order = [...size.keys()]
    .filter((g) => size[g]! > 0)
    .sort((a, b) => size[b]! - size[a]! || first[a]! - first[b]!);
  const number = new Int32Array(count);
  order.forEach((g, at) => (number[g] = at));
  return labels.map((g) => (g < 0 ? g : number[g]!));
}
