import { dot, spectrum, type LaplacianKind, type Network, type Watch } from '@/numerics';
import type { Warp } from './readings';

/** Largest network whose frequencies are worked out for the picture. */
export const LARGEST = 2_000;
/** Frequencies looked at; all of them on a network of up to four times as many members. */
const MOST = 40;

/**
 * Energy of a signal by graph frequency (Shuman, Narang, Frossard, Ortega & Vandergheynst 2013), as shares of
 * ‖y − ȳ‖², beside the energy of its smoothed copy. Repeated frequencies are one band: only their space is defined.
 * Null where the network is too large, a value is unknown, or nothing varies.
 * @param values by member, missing ones filled in
 * @param smoothed by member
 */
export function warpOf(
  net: Network,
  values: Float64Array,
  smoothed: Float64Array,
  laplacian: LaplacianKind,
  watch?: Watch,
): Warp | null {
  const { n } = net;
  if (n > LARGEST || n < 3 || values.some(Number.isNaN) || smoothed.some(Number.isNaN)) return null;
  const centred = (signal: Float64Array): Float64Array => {
    const mean = values.reduce((sum, value) => sum + value, 0) / n;
    return signal.map((value) => value - mean);
  };
  const own = centred(values);
  const smooth = centred(smoothed);
  const total = dot(own, own);
  if (!(total > 0)) return null;
  const count = n <= 4 * MOST ? n : MOST;
  const found = spectrum(
    net,
    { laplacian, count: count === n ? 'all' : count, tolerance: 1e-7, seed: 1 },
    watch,
  );
  const bands: Warp['bands'] = [];
  found.vectors.forEach((vector, l) => {
    const value = found.values[l]!;
    const energy = dot(vector, own) ** 2 / total;
    const kept = dot(vector, smooth) ** 2 / total;
    const last = bands.at(-1);
    if (
      last &&
      found.repeated[l] === 1 &&
      found.repeated[l - 1] === 1 &&
      value - last.to <= 1e-7 * (1 + value)
    ) {
      last.energy += energy;
      last.kept += kept;
      last.count += 1;
      last.to = value;
    } else bands.push({ from: value, to: value, count: 1, energy, kept });
  });
  return { bands, members: n, frequencies: found.vectors.length, laplacian };
}
