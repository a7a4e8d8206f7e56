import { expect, test } from 'vitest';
import { benjaminiHochberg, erfc, twoSidedP } from '@/numerics';

test('erfc: values of Abramowitz & Stegun 1964, table 7.1, and of the tail in NIST DLMF 7.23', () => {
  expect(erfc(0)).toBe(1);
  expect(Math.abs(1 - erfc(1) - 0.8427007929497149)).toBeLessThan(1e-15);
  expect(Math.abs(1 - erfc(2) - 0.9953222650189527)).toBeLessThan(1e-15);
  expect(erfc(5) / 1.5374597944280349e-12).toBeCloseTo(1, 12);
  expect(erfc(10) / 2.0884875837625446e-45).toBeCloseTo(1, 12);
});

test('erfc keeps its digits where 1 − erf would lose them (series and continued fraction meet at 1)', () => {
  // Abramowitz & Stegun 1964, table 7.1; further digits from Python’s math.erfc (the C library).
  expect(Math.abs(erfc(1 - 1e-15) / erfc(1) - 1)).toBeLessThan(1e-14);
  expect(Math.abs(erfc(1.5) / 0.033894853524689274 - 1)).toBeLessThan(2e-14);
  expect(Math.abs(erfc(1.99) / 0.004888586800383003 - 1)).toBeLessThan(2e-14);
  expect(Math.abs(erfc(-0.5) - 1.5204998778130465)).toBeLessThan(1e-15);
});

test('two-sided p of the usual normal quantiles', () => {
  expect(twoSidedP(1.959963984540054)).toBeCloseTo(0.05, 14);
  expect(twoSidedP(2.5758293035489004)).toBeCloseTo(0.01, 14);
});

test('Benjamini & Hochberg 1995, table 1: at 5 % the first four of fifteen are rejected', () => {
  const p = [
    0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.324, 0.4262, 0.5719, 0.6528,
    0.759, 1,
  ];
  const q = benjaminiHochberg(Float64Array.of(...p, NaN));
  expect([...q].filter((one) => one <= 0.05).length).toBe(4);
  expect(q[3]).toBeCloseTo((0.0095 * 15) / 4, 14);
  expect(q[15]).toBeNaN();
});
