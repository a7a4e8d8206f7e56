import { fixSign, norm, spectrum } from '../eigen';
import { componentMembers, components, subnetwork } from '../network';
import { laplacianOperator } from '../operators';
import { UnanswerableError, type LaplacianKind, type Network, type Watch } from '../types';
import { chooseCut, sweep, tieTolerance, type CutRule, type Sweep } from './cut';

export interface FiedlerOptions {
  readonly laplacian: LaplacianKind;
  readonly cut: CutRule;
  /** Regularisation of `regularised`; mean strength of the part that is split by default. */
  readonly tau?: number;
  /** Smallest part for `median` and `sweep`; by default max(5, 1 % of the members that are split), but never above half. */
  readonly minimumSize?: number;
  /** Members to split; all by default. */
  readonly within?: Int32Array;
  readonly seed: number;
  readonly tolerance?: number;
}

export interface FiedlerGrouping {
  /** Group of each member: 0 the larger side of the split, 1 the other, 2… the islets; −1 outside `within`. */
  readonly labels: Int32Array;
  /** Ordering vector; NaN outside the component that was split. */
  readonly vector: Float64Array;
  /** First eigenvalues of the chosen Laplacian on the component that was split: 0, λ₂ and, if there is one, λ₃. */
  readonly eigenvalues: Float64Array;
  readonly residuals: Float64Array;
  /** Whether λ₂ is repeated: then the vector is one of many equally good ones. */
  readonly repeated: boolean;
  /** λ₂(𝓛)/2 ≤ lowest conductance of any split ≤ √(2 λ₂(𝓛)) (Chung 1997), of the component that was split. */
  readonly cheeger: { readonly lower: number; readonly upper: number };
  /** What was split: how many members, which component (numbered as `components` of the chosen members does). */
  readonly scope: { readonly members: number; readonly component: number };
  /** Groups that are whole components beside the one that was split. */
  readonly islets: readonly number[];
  /** Order in member indexes of the whole network. */
  readonly sweep: Sweep;
  readonly tau: number;
}

/**
 * Splits a network in two along the second eigenvector of a Laplacian (Fiedler 1973; Shi & Malik 2000;
 * regularised: Zhang & Rohe 2018). On a disconnected network the largest component is split and every other
 * component becomes a group of its own, an islet.
 *
 * @throws UnanswerableError `no-ties` when the largest component has one member; `no-cut` when the rule allows no cut
 */
export function fiedlerGrouping(net: Network, options: FiedlerOptions, watch?: Watch): FiedlerGrouping {
  const chosen = options.within ?? Int32Array.from({ length: net.n }, (_, i) => i);
  const local = options.within ? subnetwork(net, chosen) : net;
  const parts = components(local);
  const members = componentMembers(parts);
  if (parts.count === 0 || parts.sizes[parts.largest]! < 2) {
    throw new UnanswerableError(
      'no-ties',
      'There are no ties among the chosen members, so there is no seam to split along.',
    );
  }
  const inside = members[parts.largest]!;
  const part = parts.count === 1 ? local : subnetwork(local, inside);
  const { ordering, solution } = orderingVector(part, options, watch);
  const cheeger = cheegerBounds(part, options, solution, watch);

  const relative = Math.max(1e-10, Math.min(1e-7, solution.residuals[1]! / solution.norm));
  const tolerance = tieTolerance(ordering, relative);
  const swept = sweep(part, ordering, tolerance);
  const usual = Math.min(Math.floor(part.n / 2), Math.max(5, Math.ceil(0.01 * part.n)));
  const below = chooseCut(options.cut, ordering, swept, options.minimumSize ?? usual, tolerance);

  const labels = new Int32Array(net.n).fill(-1);
  const vector = new Float64Array(net.n).fill(NaN);
  const toNet = Int32Array.from(inside, (a) => chosen[a]!);
  const lowerIsFirst = below > part.n - below || (2 * below === part.n && holdsFirst(swept.order, below));
  for (let r = 0; r < part.n; r++) {
    const a = swept.order[r]!;
    labels[toNet[a]!] = r < below === lowerIsFirst ? 0 : 1;
    vector[toNet[a]!] = ordering[a]!;
  }
  const islets = labelIslets(labels, members, parts.largest, chosen);
  return {
    labels,
    vector,
    eigenvalues: solution.values,
    residuals: solution.residuals,
    repeated: solution.repeated[1] === 1,
    cheeger,
    scope: { members: part.n, component: parts.largest },
    islets,
    sweep: { ...swept, order: swept.order.map((a) => toNet[a]!) },
    tau: solution.tau,
  };
}

/** Second eigenvector of a connected network, mapped back by D^{-1/2} (D_τ^{-1/2}) and scaled to unit length. */
function orderingVector(part: Network, options: FiedlerOptions, watch?: Watch) {
  const { laplacian, tau, tolerance, seed } = options;
  const solution = spectrum(part, { laplacian, tau, count: 3, tolerance, seed }, watch);
  const { scale } = laplacianOperator(part, laplacian, tau);
  const ordering = solution.vectors[1]!.map((u, i) => u * scale[i]!);
  const size = norm(ordering);
  for (let i = 0; i < part.n; i++) ordering[i]! /= size;
  fixSign(ordering);
  return { ordering, solution };
}

function cheegerBounds(
  part: Network,
  options: FiedlerOptions,
  solution: { values: Float64Array },
  watch?: Watch,
) {
  const { seed, laplacian } = options;
  // Only a bound: on large networks a few digits of it do, at a tenth of the work and memory.
  const tolerance = part.n > 20_000 ? 1e-5 : options.tolerance;
  const lambda =
    laplacian === 'normalised'
      ? solution.values[1]!
      : spectrum(part, { laplacian: 'normalised', count: 2, tolerance, seed }, watch).values[1]!;
  return { lower: lambda / 2, upper: Math.sqrt(2 * lambda) };
}

function holdsFirst(order: Int32Array, below: number): boolean {
  for (let r = 0; r < below; r++) if (order[r] === 0) return true;
  return false;
}

/** Numbers the other components from 2 on, largest first. */
function labelIslets(
  labels: Int32Array,
  members: Int32Array[],
  largest: number,
  chosen: Int32Array,
): number[] {
  const others = [...members.keys()].filter((c) => c !== largest);
  others.sort((x, y) => members[y]!.length - members[x]!.length || x - y);
  return others.map((c, at) => {
    for (const a of members[c]!) labels[chosen[a]!] = at + 2;
    return at + 2;
  });
}
