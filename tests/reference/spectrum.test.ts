/**
 * Networks and graph frequencies against tests/reference/data/<name>/reference.json, keys `basic.` and `spectrum.`:
 * computed there with numpy/SciPy/networkx/igraph and R's spdep and Matrix (see `computed_with` beside each value).
 */
import { describe, expect, it } from 'vitest';
import { components, spectrum, tieCount, totalWeight, type LaplacianKind } from '@/numerics';
import { compare } from './compare';
import { loadReference, referenceNames, type Reference } from './load';

const all = (reference: Reference, laplacian: LaplacianKind) =>
  spectrum(reference.network, { laplacian, count: 'all' });

/** Sizes of runs of equal eigenvalues, equal within 1e-8 of the largest. */
function multiplicities(values: Float64Array): number[] {
  const bar = 1e-8 * values[values.length - 1]!;
  const runs: number[] = [];
  values.forEach((value, l) => {
    if (l > 0 && value - values[l - 1]! <= bar) runs[runs.length - 1]!++;
    else runs.push(1);
  });
  return runs;
}

const answers: Record<string, (reference: Reference) => unknown> = {
  'basic.n': ({ network }) => network.n,
  'basic.m': ({ network }) => tieCount(network),
  'basic.total_weight': ({ network }) => totalWeight(network),
  'basic.volume': ({ network }) => 2 * totalWeight(network),
  'basic.degree_weighted': ({ network }) => network.strength,
  'basic.n_components': ({ network }) => components(network).count,
  'basic.component': ({ network }) => Array.from(components(network).labels),
  'basic.isolated': ({ network }) =>
    [...network.strength.keys()].filter((i) => network.offsets[i] === network.offsets[i + 1]),
  'spectrum.L': (reference) => all(reference, 'combinatorial').values,
  'spectrum.Lsym': (reference) => all(reference, 'normalised').values,
  'spectrum.complete': (reference) => all(reference, 'combinatorial').complete,
  'spectrum.multiplicity_L': (reference) => multiplicities(all(reference, 'combinatorial').values),
  'spectrum.multiplicity_Lsym': (reference) => multiplicities(all(reference, 'normalised').values),
  'spectrum.zero_eigenvalues_L': (reference) =>
    all(reference, 'combinatorial').values.filter((value) => value === 0).length,
  'spectrum.trace_L': (reference) =>
    all(reference, 'combinatorial').values.reduce((sum, value) => sum + value, 0),
};

describe.each([...referenceNames])('%s', (name) => {
  const reference = loadReference(name);
  const keys = Object.keys(reference.expected).filter((key) => /^(basic|spectrum)\./.test(key));
  it.each(keys)('%s', (key) => {
    const answer = answers[key];
    if (!answer) throw new Error(`no check for the key ${key}`);
    compare(answer(reference), reference.expected[key]!, key);
  });

  it.each(['combinatorial', 'normalised', 'regularised'] as const)(
    '%s residuals, orthonormality and trace',
    (laplacian) => {
      const { n } = reference.network;
      const { values, vectors, residuals, norm } = all(reference, laplacian);
      for (const residual of residuals) expect(residual).toBeLessThanOrEqual(1e-8 * norm);
      for (let a = 0; a < n; a++) {
        for (let b = a; b < n; b++) {
          const inner = vectors[a]!.reduce((sum, x, i) => sum + x * vectors[b]![i]!, 0);
          expect(Math.abs(inner - (a === b ? 1 : 0))).toBeLessThan(1e-11);
        }
      }
      expect(values[0]).toBe(0);
      for (let l = 1; l < n; l++) expect(values[l]!).toBeGreaterThanOrEqual(values[l - 1]!);
    },
  );
});

it('every folder of data is walked', () => {
  expect(referenceNames.length).toBeGreaterThanOrEqual(13);
});
