import { describe, expect, it } from 'vitest';
import { buildNetwork } from '@/numerics';
import { warpOf } from '@/features/readings/warp';

/** A path of n members: λ_l = 2 − 2 cos(πl/n), u_l ∝ cos(πl(i + ½)/n) (Strang 1999, the DCT-2 basis). */
const path = (n: number) =>
  buildNetwork(
    n,
    Int32Array.from({ length: n - 1 }, (_, i) => i),
    Int32Array.from({ length: n - 1 }, (_, i) => i + 1),
    new Float64Array(n - 1).fill(1),
  );
const mode = (n: number, l: number) =>
  Float64Array.from({ length: n }, (_, i) => Math.cos((Math.PI * l * (i + 0.5)) / n));

describe('warpOf', () => {
  it('puts a cosine of a path wholly into its own frequency', () => {
    const warp = warpOf(
      path(12),
      mode(12, 3),
      mode(12, 3).map((value) => value / 2),
      'combinatorial',
    )!;
    expect(warp.frequencies).toBe(12);
    const band = warp.bands[3]!;
    expect(band.from).toBeCloseTo(2 - 2 * Math.cos((Math.PI * 3) / 12), 10);
    expect(band.energy).toBeCloseTo(1, 10);
    expect(band.kept).toBeCloseTo(0.25, 10);
    expect(warp.bands.reduce((sum, one) => sum + one.energy, 0)).toBeCloseTo(1, 10);
  });
  it('ignores the level: shares are of the variation about the mean', () => {
    const lifted = mode(12, 3).map((value) => value + 40);
    const warp = warpOf(path(12), lifted, lifted, 'combinatorial')!;
    expect(warp.bands[0]!.energy).toBeCloseTo(0, 8);
    expect(warp.bands[3]!.energy).toBeCloseTo(1, 8);
  });
  it('keeps a repeated frequency as one band', () => {
    const ring = buildNetwork(
      8,
      Int32Array.from({ length: 8 }, (_, i) => i),
      Int32Array.from({ length: 8 }, (_, i) => (i + 1) % 8),
      new Float64Array(8).fill(1),
    );
    const values = Float64Array.from({ length: 8 }, (_, i) => Math.cos((2 * Math.PI * i) / 8 + 0.7));
    const warp = warpOf(ring, values, values, 'combinatorial')!;
    expect(warp.bands.map((band) => band.count)).toEqual([1, 2, 2, 2, 1]);
    expect(warp.bands[1]!.energy).toBeCloseTo(1, 10);
  });
  it('has no picture where nothing varies or a value is unknown', () => {
    const flat = new Float64Array(12).fill(3);
    expect(warpOf(path(12), flat, flat, 'combinatorial')).toBeNull();
    const hole = mode(12, 1);
    hole[4] = NaN;
    expect(warpOf(path(12), hole, hole, 'combinatorial')).toBeNull();
  });
});
