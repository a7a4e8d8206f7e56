import { expect } from 'vitest';
import type { Expected } from './load';

/** Compares by the rule that stands beside the expected value; an unknown rule fails. */
export function compare(actual: unknown, expected: Expected, key: string): void {
  const { value, tolerance } = expected;
  switch (expected.compare) {
    case 'exact':
      expect(actual, key).toEqual(value);
      return;
    case 'abs':
      near(numbers(actual), numbers(value), tolerance!, key);
      return;
    case 'vector up to global sign': {
      const a = numbers(actual);
      const b = numbers(value);
      const along = a.reduce((sum, x, i) => sum + x * b[i]!, 0);
      near(along < 0 ? a.map((x) => -x) : a, b, tolerance!, key);
      return;
    }
    case 'partition up to relabelling':
    case 'partition up to relabelling (0/1 may swap)':
      expect(canonical(numbers(actual)), key).toEqual(canonical(numbers(value)));
      return;
    default:
      throw new Error(`${key}: unknown rule of comparison “${expected.compare}”`);
  }
}

function numbers(value: unknown): number[] {
  const list = typeof value === 'number' ? [value] : Array.from(value as ArrayLike<unknown>);
  for (const x of list) if (typeof x !== 'number') throw new Error('not a number');
  return list as number[];
}

export function near(actual: number[], expected: number[], tolerance: number, key: string): void {
  expect(actual.length, `${key}: length`).toBe(expected.length);
  actual.forEach((x, i) => {
    if (!(Math.abs(x - expected[i]!) <= tolerance)) {
      throw new Error(`${key}[${i}]: ${x} differs from ${expected[i]} by more than ${tolerance}`);
    }
  });
}

/** Labels renumbered by first appearance. */
function canonical(labels: number[]): number[] {
  const seen = new Map<number, number>();
  return labels.map((label) => {
    if (!seen.has(label)) seen.set(label, seen.size);
    return seen.get(label)!;
  });
}
