import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { localityOrder, spectrum, subnetwork, type Network, type Spectrum } from '@/numerics';
import { inSeconds, peakMemory, ratio, seconds, table } from './measure';
import { ringLattice, socialNetwork } from './networks';

interface Case {
  readonly name: string;
  readonly make: () => Network;
  readonly counts: readonly number[];
  readonly tolerance: number;
  readonly runs: number;
  /** ARPACK needs minutes on a ring, whose gap is tiny, and finds each double value once. */
  readonly peer: boolean;
}

/** Both sides work on the network in an order that keeps ties near, as an import would keep it. */
const ordered = (net: Network): Network => subnetwork(net, localityOrder(net));

const CASES: readonly Case[] = [
  {
    name: '10,000 / 50,000',
    make: () => ordered(socialNetwork(10_000, 50_000)),
    counts: [1, 8, 32],
    tolerance: 1e-8,
    runs: 7,
    peer: true,
  },
  {
    name: '100,000 / 1,000,000',
    make: () => ordered(socialNetwork(100_000, 1_000_000)),
    counts: [1, 8, 32],
    tolerance: 1e-8,
    runs: 1,
    peer: true,
  },
  {
    name: 'ring lattice 100,000',
    make: () => ringLattice(100_000),
    counts: [1, 8],
    tolerance: 1e-8,
    runs: 1,
    peer: false,
  },
  {
    name: '1,000,000 / 5,000,000',
    make: () => ordered(socialNetwork(1_000_000, 5_000_000)),
    counts: [1, 8],
    tolerance: 1e-6,
    runs: 1,
    peer: true,
  },
];

interface PeerAnswer {
  readonly scipy: string;
  readonly seconds: number;
  readonly values: number[];
  readonly residual: number;
}

const hasScipy = (): boolean => spawnSync('python3', ['-c', 'import scipy']).status === 0;

/** Smallest pairs of the normalised Laplacian beside SciPy's ARPACK on the same matrix. */
export function benchEigen(quick: boolean): void {
  const peerThere = hasScipy();
  if (!peerThere)
    process.stdout.write('SciPy is not here (Debian: python3-scipy), so there is no peer to compare with.\n');
  const rows: string[][] = [];
  for (const one of quick ? CASES.slice(0, 3) : CASES) {
    const net = one.make();
    const folder = mkdtempSync(join(tmpdir(), 'thrum-bench-'));
    writeFileSync(join(folder, 'offsets.bin'), net.offsets);
    writeFileSync(join(folder, 'targets.bin'), net.targets);
    writeFileSync(join(folder, 'weights.bin'), net.weights);
    for (const k of one.counts) {
      const solve = (): Spectrum =>
        spectrum(net, { laplacian: 'normalised', count: k + 1, tolerance: one.tolerance });
      let found: Spectrum | null = null;
      const own = seconds(one.runs, () => (found = solve()));
      const peer =
        one.peer && peerThere
          ? (JSON.parse(
              execFileSync('python3', [
                'tests/bench/arpack.py',
                folder,
                String(k),
                String(one.tolerance),
                String(one.runs),
              ]).toString(),
            ) as PeerAnswer)
          : null;
      rows.push([
        one.name,
        String(k),
        inSeconds(own),
        peer ? inSeconds(peer.seconds) : '–',
        peer ? ratio(own, peer.seconds) : '–',
        Math.max(...found!.residuals).toExponential(1),
        peer ? peer.residual.toExponential(1) : '–',
        peer ? Math.abs(found!.values[k]! - peer.values[k - 1]!).toExponential(1) : '–',
      ]);
      process.stdout.write(`${rows.at(-1)!.join('  ')}\n`);
    }
    rmSync(folder, { recursive: true });
  }
  table(['members / ties', 'k', 'own s', 'ARPACK s', 'ratio', 'residual', 'its residual', 'λ apart'], rows);
  process.stdout.write(`Peak memory ${peakMemory()}.\n`);
}
