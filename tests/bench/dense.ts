import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { createRandom, symmetricEigen } from '@/numerics';
import { inSeconds, ratio, seconds, table } from './measure';

/** The full decomposition beside ml-matrix's own, on random symmetric matrices. */
export function benchDense(quick: boolean): void {
  const rows = (quick ? [200, 500] : [200, 500, 1_000, 2_000]).map((n) => {
    const random = createRandom(n);
    const a = new Float64Array(n * n);
    for (let i = 0; i < n; i++) for (let j = i; j < n; j++) a[i * n + j] = a[j * n + i] = random.next() - 0.5;
    const runs = n <= 500 ? 3 : 1;
    const own = seconds(runs, () => symmetricEigen(a.slice(), n));
    if (n > 1_000) return [String(n), inSeconds(own), '–', '–'];
    const rowsOf = Array.from({ length: n }, (_, i) => Array.from(a.subarray(i * n, (i + 1) * n)));
    const peer = seconds(
      runs,
      () => new EigenvalueDecomposition(new Matrix(rowsOf), { assumeSymmetric: true }).eigenvectorMatrix,
    );
    return [String(n), inSeconds(own), inSeconds(peer), ratio(own, peer)];
  });
  table(['n', 'own s', 'ml-matrix s', 'ratio'], rows);
}
