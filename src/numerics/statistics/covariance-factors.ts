import { chiSquaredP, chiSquaredQuantile } from './gamma';

/**
 * Consistency factor of a covariance of the `share` of Gaussian rows with the smallest distances:
 * share / P(χ²_{k+2} ≤ q), q the `share` quantile of χ²_k (Croux & Haesbroeck 1999; Butler, Davies & Jhun 1993).
 */
export function consistencyFactor(k: number, share: number): number {
  if (share >= 1) return 1;
  return share / (1 - chiSquaredP(chiSquaredQuantile(share, k), k + 2));
}

/** log(1 − f) = constant − power · log n of the simulations of Pison, Van Aelst & Willems 2002, at h/n = ½ and ⅞. */
interface Fit {
  readonly constant: number;
  readonly power: number;
}
type Stage = 'raw' | 'reweighted';

const FEW: Record<Stage, Record<1 | 2, { readonly half: Fit; readonly most: Fit }>> = {
  raw: {
    1: {
      half: { constant: 0.262024211897096, power: 0.604756680630497 },
      most: { constant: -0.351584646688712, power: 1.01646567502486 },
    },
    2: {
      half: { constant: 0.673292623522027, power: 0.691365864961895 },
      most: { constant: 0.446537815635445, power: 1.06690782995919 },
    },
  },
  reweighted: {
    1: {
      half: { constant: 1.11098143415027, power: 1.5182890270453 },
      most: { constant: -0.66046776772861, power: 0.88939595831888 },
    },
    2: {
      half: { constant: 3.11101712909049, power: 1.91401056721863 },
      most: { constant: 0.79473550581058, power: 1.10081930350091 },
    },
  },
};

/** For k > 2: 1 − f = size / k^power at n = 2k² and at n = 3k². */
interface Points {
  readonly size: readonly [number, number];
  readonly power: readonly [number, number];
}
const MANY: Record<Stage, { readonly half: Points; readonly most: Points }> = {
  raw: {
    half: { size: [1.42764571687802, 1.06141115981725], power: [1.26263336932151, 1.28907991440387] },
    most: { size: [0.455179464070565, 0.294241208320834], power: [1.11192541278794, 1.09649329149811] },
  },
  reweighted: {
    half: { size: [1.02842572724793, 0.26800273450853], power: [1.67659883081926, 1.35968562893582] },
    most: { size: [0.544482443573914, 0.343791072183285], power: [1.25994483222292, 1.25159004257133] },
  },
};

function through({ size, power }: Points, k: number): Fit {
  const [first, second] = [Math.log(size[0] / k ** power[0]), Math.log(size[1] / k ** power[1])];
  const slope = (first - second) / Math.log(3 / 2);
  return { constant: first + slope * Math.log(2 * k * k), power: slope };
}

/**
 * Small-sample factor of the minimum covariance determinant with h/n = share, ½ ≤ share ≤ ⅞, linear in between
 * (Pison, Van Aelst & Willems 2002): above 1, as a covariance of few rows that were picked for being close is too small.
 */
export function smallSampleFactor(stage: Stage, n: number, k: number, share: number): number {
  const fits =
    k === 1 || k === 2
      ? FEW[stage][k]
      : { half: through(MANY[stage].half, k), most: through(MANY[stage].most, k) };
  const at = ({ constant, power }: Fit): number => 1 - Math.exp(constant) / n ** power;
  const half = at(fits.half);
  const f = half + ((at(fits.most) - half) / 0.375) * (share - 0.5);
  // The fits are extrapolations below about five rows a column; never more than double there.
  return 1 / Math.max(0.5, f);
}
