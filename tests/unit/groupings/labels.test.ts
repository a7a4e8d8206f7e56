import { describe, expect, it } from 'vitest';
import { orderGroups, proposeNames } from '@/features/groupings/labels';
import { matrixOf } from '@/features/groupings/between';
import { profiles } from '@/features/groupings/profile';

describe('orderGroups', () => {
  it('numbers by falling size with islets last, and leaves members outside alone', () => {
    const { labels, islet } = orderGroups(Int32Array.of(7, 3, 3, 5, 5, 5, 5, -1), new Set([5]));
    expect([...labels]).toEqual([1, 0, 0, 2, 2, 2, 2, -1]);
    expect(islet).toEqual([false, false, true]);
  });
  it('breaks equal sizes by the first member', () => {
    expect([...orderGroups(Int32Array.of(9, 2, 2, 9), new Set()).labels]).toEqual([0, 1, 1, 0]);
  });
});

describe('proposeNames', () => {
  const labels = Int32Array.of(0, 0, 0, 0, 0, 1, 1, 1, 1, 1);
  it('names a group by what at least 60 % of its labelled members share', () => {
    const words = ['reed', 'reed', 'reed', 'fern', 'fern', 'fern', 'fern', 'fern', null, null];
    expect(proposeNames(labels, 2, [words])).toEqual(['reed', 'fern']);
    const split = ['reed', 'reed', 'oak', 'fern', 'fern', 'fern', 'fern', 'fern', null, null];
    expect(proposeNames(labels, 2, [split])).toEqual([null, 'fern']);
  });
  it('gives no name twice, and none on two labels alone', () => {
    expect(proposeNames(labels, 2, [new Array<string>(10).fill('reed')])).toEqual([null, null]);
    const few = ['reed', 'reed', null, null, null, null, null, null, null, null];
    expect(proposeNames(labels, 2, [few])).toEqual([null, null]);
  });
});

describe('matrixOf', () => {
  it('counts ties per 1,000 pairs that could exist, null where none can', () => {
    const { weights, perThousand } = matrixOf(
      [
        { a: 0, b: 0, ties: 3, weight: 6 },
        { a: 0, b: 1, ties: 1, weight: 2 },
      ],
      [4, 1],
    );
    expect(weights).toEqual([
      [6, 2],
      [2, 0],
    ]);
    expect(perThousand).toEqual([
      [500, 250],
      [250, null],
    ]);
  });
});

describe('profiles', () => {
  it('is in standard deviations of all, with the standard error of the group mean', () => {
    const values = Float64Array.of(1, 3, 5, 7, NaN);
    const [first, second] = profiles(Int32Array.of(0, 0, 1, 1, 1), 2, [{ name: 'score', values }]);
    const deviation = Math.sqrt(20 / 3);
    expect(first![0]).toMatchObject({ attribute: 'score', count: 2 });
    expect(first![0]!.difference).toBeCloseTo(-2 / deviation, 12);
    expect(second![0]!.difference).toBeCloseTo(2 / deviation, 12);
    expect(first![0]!.error).toBeCloseTo(Math.SQRT2 / deviation / Math.SQRT2, 12);
  });
  it('leaves out what does not vary and groups with one score', () => {
    const flat = { name: 'flat', values: Float64Array.of(2, 2, 2) };
    const thin = { name: 'thin', values: Float64Array.of(1, 2, 3) };
    const [first, second] = profiles(Int32Array.of(0, 0, 1), 2, [flat, thin]);
    expect(first!.map((entry) => entry.attribute)).toEqual(['thin']);
    expect(second).toEqual([]);
  });
});
