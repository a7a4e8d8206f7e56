import { describe, expect, test } from 'vitest';
import { erfc, globalStatistics, localMoran, observedTies, QUADRANTS } from '@/numerics';
import { loadReference, referenceNames } from './load';

test('erfc: values of Abramowitz & Stegun 1964, table 7.1, and of the tail in NIST DLMF 7.23', () => {
  expect(erfc(0)).toBe(1);
  expect(Math.abs(1 - erfc(1) - 0.8427007929497149)).toBeLessThan(1e-15);
  expect(Math.abs(1 - erfc(2) - 0.9953222650189527)).toBeLessThan(1e-15);
  expect(erfc(5) / 1.5374597944280349e-12).toBeCloseTo(1, 12);
  expect(erfc(10) / 2.0884875837625446e-45).toBeCloseTo(1, 12);
});

/** Keys of one reference file under `signals.<name>.<block>.`. */
describe.each(referenceNames.map((name) => [name, loadReference(name)] as const))(
  '%s',
  (_name, reference) => {
    const value = (key: string): unknown => reference.expected[key]?.value;
    const near = (key: string, actual: number): void => {
      const expected = reference.expected[key];
      if (expected === undefined || expected.value === null) return;
      expect(Math.abs(actual - (expected.value as number)), key).toBeLessThanOrEqual(expected.tolerance ?? 0);
    };
    const nearAll = (key: string, actual: ArrayLike<number>): void => {
      const expected = reference.expected[key];
      if (expected === undefined) return;
      (expected.value as (number | null)[]).forEach((one, i) => {
        if (one !== null)
          expect(Math.abs(actual[i]! - one), `${key}[${i}]`).toBeLessThanOrEqual(expected.tolerance ?? 0);
      });
    };
    const signals = Object.keys(reference.signals).filter(
      (name) => value(`signals.${name}.moran_W.I`) !== undefined,
    );
    test.each(signals.length > 0 ? signals : ['none'])('%s', (name) => {
      if (name === 'none') {
        expect(signals).toEqual([]);
        return;
      }
      const values = Float64Array.from(reference.signals[name]!, (one) =>
        typeof one === 'number' ? one : NaN,
      );
      const ties = observedTies(reference.network, values);
      for (const [style, letter] of [
        ['row', 'W'],
        ['raw', 'B'],
      ] as const) {
        // Where members lack neighbours the file has both conventions; ours leaves them out of n.
        const adjusted = value(`signals.${name}.moran_${letter}_adjust_n.I`) === undefined ? '' : '_adjust_n';
        const key = `signals.${name}.moran_${letter}${adjusted}`;
        const { moran, geary } = globalStatistics(ties, style, 0, 1);
        near(`${key}.I`, moran.value);
        near(`${key}.E_I`, moran.expectation);
        near(`${key}.var_rand`, moran.variance);
        near(`${key}.z_rand`, moran.z);
        near(`${key}.p_two_sided_rand`, moran.p);
        near(`signals.${name}.geary_${letter}${adjusted}.C`, geary.value);
        near(`signals.${name}.geary_${letter}${adjusted}.var_rand`, geary.variance);
        near(`signals.${name}.geary_${letter}${adjusted}.z_rand`, geary.z);
        near(`signals.${name}.geary_${letter}${adjusted}.p_two_sided_rand`, geary.p);
        const local = localMoran(ties, reference.n, style);
        const block = `signals.${name}.local_${letter}`;
        nearAll(`${block}.I`, local.I);
        nearAll(`${block}.E_cond`, local.expectation);
        nearAll(`${block}.var_cond`, local.variance);
        nearAll(`${block}.z_cond`, local.z);
        nearAll(`${block}.p_cond_two_sided`, local.p);
        nearAll(`${block}.q_BH`, local.q);
        const quadrants = value(`${block}.quadrant`) as (string | null)[] | undefined;
        quadrants?.forEach((one, i) => {
          if (one) expect(QUADRANTS[local.quadrant[i]!], `${block}.quadrant[${i}]`).toBe(one);
        });
      }
      const complete = value(`missing.${name}.complete_case_moran_W.I`);
      if (complete !== undefined) {
        const { moran, geary } = globalStatistics(ties, 'row', 0, 1);
        expect(moran.n).toBe(value(`missing.${name}.complete_case_moran_W.n_used`));
        near(`missing.${name}.complete_case_moran_W.I`, moran.value);
        near(`missing.${name}.complete_case_moran_W.var_rand`, moran.variance);
        near(`missing.${name}.complete_case_geary_W.C`, geary.value);
      }
      const known = reference.expected[`signals.${name}.moran_W_perm.p_greater`];
      if (known) {
        // Monte Carlo bound stated in the file; ours is two-sided, so compare where both tails are negligible.
        const { moran } = globalStatistics(ties, 'row', 999, 7);
        if ((known.value as number) < 0.001) expect(moran.permutationP).toBeLessThan(0.01);
      }
    });
  },
);
