import { describe, expect, test } from 'vitest';
import { takeReading, type LaplacianKind, type ReadingFilter, type ReadingResult } from '@/numerics';
import { loadReference, referenceNames, type Expected } from './load';

const LAPLACIANS: Record<string, LaplacianKind> = { L: 'combinatorial', Lsym: 'normalised' };

/** `tikhonov_L_alpha10` → the filter of the file, as in ../README of the data. */
function filterOf(
  key: string,
  signal: string,
  expected: Readonly<Record<string, Expected>>,
): { filter: ReadingFilter; laplacian: LaplacianKind } | null {
  const [, kind, l, amount] = /^(tikhonov|heat|ideal)_(Lsym|L)_(?:alpha|tau|keep)(.+)$/.exec(key) ?? [];
  if (!kind || !l || !amount) return null;
  const laplacian = LAPLACIANS[l]!;
  const number = Number(amount.replace('_', '.'));
  if (kind === 'tikhonov') return { laplacian, filter: { kind, alpha: number } };
  if (kind === 'heat') return { laplacian, filter: { kind, tau: number } };
  return {
    laplacian,
    filter: { kind: 'low-pass', keep: expected[`signals.${signal}.ideal_K`]!.value as number },
  };
}

describe.each(referenceNames.map((name) => [name, loadReference(name)] as const))(
  '%s',
  (_name, reference) => {
    const { expected, network, n } = reference;
    const read = (values: Float64Array, filter: ReadingFilter, laplacian: LaplacianKind): ReadingResult =>
      takeReading(network, {
        values,
        precision: null,
        groups: null,
        filter,
        laplacian,
        neighbourFloor: 1,
        permutations: 0,
        seed: 1,
      });
    const compare = (key: string, actual: ArrayLike<number>): void => {
      const { value, tolerance } = expected[key]!;
      (value as (number | null)[]).forEach((one, i) => {
        if (one === null) expect(Number.isNaN(actual[i]!), `${key}[${i}]`).toBe(true);
        else expect(Math.abs(actual[i]! - one), `${key}[${i}]`).toBeLessThanOrEqual(tolerance ?? 0);
      });
    };
    const signal = (name: string): Float64Array =>
      Float64Array.from(reference.signals[name]!, (one) => (typeof one === 'number' ? one : NaN));
    const filters = Object.keys(expected).flatMap((key) => {
      const [, name, filter] = /^signals\.([^.]+)\.filters\.(.+)$/.exec(key) ?? [];
      return name && filter ? [[key, name, filter] as const] : [];
    });
    const missing = Object.keys(expected).flatMap((key) => {
      const [, name, alpha] = /^missing\.([^.]+)\.regularised_alpha(.+)$/.exec(key) ?? [];
      return name && alpha ? [[key, name, Number(alpha.replace('_', '.'))] as const] : [];
    });
    const outliers = Object.keys(expected).flatMap(
      (key) => /^signals\.([^.]+)\.outliers\.leverage$/.exec(key)?.[1] ?? [],
    );

    test('filters', () => {
      for (const [key, name, kind] of filters) {
        const chosen = filterOf(kind, name, expected);
        expect(chosen, `unknown filter ${kind}`).not.toBeNull();
        compare(key, read(signal(name), chosen!.filter, chosen!.laplacian).columns.smoothed);
      }
      expect(filters.length + missing.length).toBeGreaterThanOrEqual(0);
    });

    test('missing scores are filled in as by the closed formula', () => {
      for (const [key, name, alpha] of missing) {
        const { smoothed } = read(signal(name), { kind: 'tikhonov', alpha }, 'combinatorial').columns;
        const places = expected[`missing.${name}.missing`]!.value as number[];
        compare(
          key,
          places.map((i) => smoothed[i]!),
        );
      }
      expect(n).toBe(reference.ids.length);
    });

    test('leverages and left-out departures', () => {
      for (const name of outliers) {
        const alpha = expected[`signals.${name}.outliers.alpha`]!.value as number;
        const { columns } = read(signal(name), { kind: 'tikhonov', alpha }, 'combinatorial');
        compare(`signals.${name}.outliers.leverage`, columns.leverage);
        compare(`signals.${name}.outliers.loo_residual`, columns.departure);
      }
      expect(network.n).toBe(n);
    });
  },
);
