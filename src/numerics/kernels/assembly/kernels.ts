// AssemblyScript, compiled into ../compiled.ts by `npm run kernels`. All pointers are byte offsets into one shared
// memory; every function works on the rows lo ≤ i < hi, so that two threads can share one call.

/** Two doubles from two places. */
function pair(x: usize, a: i32, b: i32): v128 {
  return v128.load_lane<f64>(x + ((<usize>b) << 3), v128.load_zero<f64>(x + ((<usize>a) << 3)), 1);
}

/** out_i = (α diagonal_i + β) x_i − α Σ_j s_ij x_j + γ z_i − shift · scale_i, for the sparse rows s. */
export function rows(
  lo: i32,
  hi: i32,
  offsets: usize,
  targets: usize,
  values: usize,
  diagonal: usize,
  scale: usize,
  x: usize,
  z: usize,
  alpha: f64,
  beta: f64,
  gamma: f64,
  shift: f64,
  out: usize,
): void {
  let p = load<i32>(offsets + ((<usize>lo) << 2));
  for (let i = lo; i < hi; i++) {
    const end = load<i32>(offsets + ((<usize>i) << 2), 4);
    let t = targets + ((<usize>p) << 2);
    let v = values + ((<usize>p) << 3);
    let a = f64x2.splat(0);
    let b = f64x2.splat(0);
    for (; p + 3 < end; p += 4) {
      a = f64x2.add(a, f64x2.mul(v128.load(v), pair(x, load<i32>(t), load<i32>(t, 4))));
      b = f64x2.add(b, f64x2.mul(v128.load(v, 16), pair(x, load<i32>(t, 8), load<i32>(t, 12))));
      t += 16;
      v += 32;
    }
    a = f64x2.add(a, b);
    let sum = f64x2.extract_lane(a, 0) + f64x2.extract_lane(a, 1);
    for (; p < end; p++) {
      sum += load<f64>(v) * load<f64>(x + ((<usize>load<i32>(t)) << 3));
      t += 4;
      v += 8;
    }
    const at = (<usize>i) << 3;
    store<f64>(
      out + at,
      (alpha * load<f64>(diagonal + at) + beta) * load<f64>(x + at) -
        alpha * sum +
        gamma * load<f64>(z + at) -
        shift * load<f64>(scale + at),
    );
  }
}

/**
 * Eight vectors side by side (x[8 i + v]): out_i = (own_i + α diagonal_i) x_i − α Σ_j s_ij x_j − shift_v scale_i,
 * and dots_v = Σ_i x_iv out_iv over the rows.
 */
export function rows8(
  lo: i32,
  hi: i32,
  offsets: usize,
  targets: usize,
  values: usize,
  diagonal: usize,
  scale: usize,
  own: usize,
  x: usize,
  alpha: f64,
  shift: usize,
  out: usize,
  dots: usize,
): void {
  let p = load<i32>(offsets + ((<usize>lo) << 2));
  let da = f64x2.splat(0);
  let db = f64x2.splat(0);
  let dc = f64x2.splat(0);
  let dd = f64x2.splat(0);
  const sa = v128.load(shift);
  const sb = v128.load(shift, 16);
  const sc = v128.load(shift, 32);
  const sd = v128.load(shift, 48);
  const minus = f64x2.splat(-alpha);
  for (let i = lo; i < hi; i++) {
    const end = load<i32>(offsets + ((<usize>i) << 2), 4);
    let a = f64x2.splat(0);
    let b = f64x2.splat(0);
    let c = f64x2.splat(0);
    let d = f64x2.splat(0);
    for (; p < end; p++) {
      const w = v128.load_splat<f64>(values + ((<usize>p) << 3));
      const q = x + ((<usize>load<i32>(targets + ((<usize>p) << 2))) << 6);
      a = f64x2.add(a, f64x2.mul(w, v128.load(q)));
      b = f64x2.add(b, f64x2.mul(w, v128.load(q, 16)));
      c = f64x2.add(c, f64x2.mul(w, v128.load(q, 32)));
      d = f64x2.add(d, f64x2.mul(w, v128.load(q, 48)));
    }
    const at = (<usize>i) << 3;
    const from = x + (at << 3);
    const to = out + (at << 3);
    const g = f64x2.splat(load<f64>(own + at) + alpha * load<f64>(diagonal + at));
    const h = f64x2.splat(load<f64>(scale + at));
    const xa = v128.load(from);
    const xb = v128.load(from, 16);
    const xc = v128.load(from, 32);
    const xd = v128.load(from, 48);
    a = f64x2.sub(f64x2.add(f64x2.mul(g, xa), f64x2.mul(minus, a)), f64x2.mul(sa, h));
    b = f64x2.sub(f64x2.add(f64x2.mul(g, xb), f64x2.mul(minus, b)), f64x2.mul(sb, h));
    c = f64x2.sub(f64x2.add(f64x2.mul(g, xc), f64x2.mul(minus, c)), f64x2.mul(sc, h));
    d = f64x2.sub(f64x2.add(f64x2.mul(g, xd), f64x2.mul(minus, d)), f64x2.mul(sd, h));
    v128.store(to, a);
    v128.store(to, b, 16);
    v128.store(to, c, 32);
    v128.store(to, d, 48);
    da = f64x2.add(da, f64x2.mul(xa, a));
    db = f64x2.add(db, f64x2.mul(xb, b));
    dc = f64x2.add(dc, f64x2.mul(xc, c));
    dd = f64x2.add(dd, f64x2.mul(xd, d));
  }
  v128.store(dots, da);
  v128.store(dots, db, 16);
  v128.store(dots, dc, 32);
  v128.store(dots, dd, 48);
}

/** sums_v = Σ_i scale_i x_iv of eight vectors side by side. */
export function weigh8(lo: i32, hi: i32, scale: usize, x: usize, sums: usize): void {
  for (let lane: usize = 0; lane < 64; lane += 16) {
    let sum = f64x2.splat(0);
    for (let i = lo; i < hi; i++) {
      const at = (<usize>i) << 3;
      sum = f64x2.add(sum, f64x2.mul(v128.load_splat<f64>(scale + at), v128.load(x + (at << 3) + lane)));
    }
    v128.store(sums + lane, sum);
  }
}

/**
 * A step of conjugate gradients on eight systems: x += step p, r −= step q (step of each system),
 * sums_v = Σ r², sums_{8+v} = Σ r² · inverse (the preconditioner's diagonal).
 */
export function advance8(
  lo: i32,
  hi: i32,
  step: usize,
  inverse: usize,
  p: usize,
  q: usize,
  x: usize,
  r: usize,
  sums: usize,
): void {
  for (let lane: usize = 0; lane < 64; lane += 16) {
    const s = v128.load(step + lane);
    let plain = f64x2.splat(0);
    let weighed = f64x2.splat(0);
    for (let i = lo; i < hi; i++) {
      const at = (<usize>i) << 3;
      const to = (at << 3) + lane;
      v128.store(x + to, f64x2.add(v128.load(x + to), f64x2.mul(s, v128.load(p + to))));
      const left = f64x2.sub(v128.load(r + to), f64x2.mul(s, v128.load(q + to)));
      v128.store(r + to, left);
      const square = f64x2.mul(left, left);
      plain = f64x2.add(plain, square);
      weighed = f64x2.add(weighed, f64x2.mul(square, v128.load_splat<f64>(inverse + at)));
    }
    v128.store(sums + lane, plain);
    v128.store(sums + 64 + lane, weighed);
  }
}

/** The next directions of eight systems: p = inverse · r + factor p. */
export function direct8(lo: i32, hi: i32, factor: usize, inverse: usize, r: usize, p: usize): void {
  const fa = v128.load(factor);
  const fb = v128.load(factor, 16);
  const fc = v128.load(factor, 32);
  const fd = v128.load(factor, 48);
  for (let i = lo; i < hi; i++) {
    const at = (<usize>i) << 3;
    const g = v128.load_splat<f64>(inverse + at);
    const from = r + (at << 3);
    const to = p + (at << 3);
    v128.store(to, f64x2.add(f64x2.mul(g, v128.load(from)), f64x2.mul(fa, v128.load(to))));
    v128.store(to, f64x2.add(f64x2.mul(g, v128.load(from, 16)), f64x2.mul(fb, v128.load(to, 16))), 16);
    v128.store(to, f64x2.add(f64x2.mul(g, v128.load(from, 32)), f64x2.mul(fc, v128.load(to, 32))), 32);
    v128.store(to, f64x2.add(f64x2.mul(g, v128.load(from, 48)), f64x2.mul(fd, v128.load(to, 48))), 48);
  }
}

/** Σ_i x_i y_i. */
export function dot(lo: i32, hi: i32, x: usize, y: usize): f64 {
  let a = f64x2.splat(0);
  let b = f64x2.splat(0);
  let i = (<usize>lo) << 3;
  const end = (<usize>hi) << 3;
  for (; i + 32 <= end; i += 32) {
    a = f64x2.add(a, f64x2.mul(v128.load(x + i), v128.load(y + i)));
    b = f64x2.add(b, f64x2.mul(v128.load(x + i, 16), v128.load(y + i, 16)));
  }
  a = f64x2.add(a, b);
  let sum = f64x2.extract_lane(a, 0) + f64x2.extract_lane(a, 1);
  for (; i < end; i += 8) sum += load<f64>(x + i) * load<f64>(y + i);
  return sum;
}

/** Rows of one round: what two passes over them reread stays in the nearest cache. */
const ROUND: i32 = 1024;

/** h_c = Σ_i basis_c,i w_i for the vectors whose pointers stand at `basis`. */
export function project(lo: i32, hi: i32, basis: usize, count: i32, w: usize, h: usize): void {
  for (let c = 0; c < count; c++) store<f64>(h + ((<usize>c) << 3), 0);
  for (let from = lo; from < hi; from += ROUND) {
    const to = min(hi, from + ROUND);
    let c = 0;
    for (; c + 3 < count; c += 4) {
      const at = basis + ((<usize>c) << 2);
      const p = <usize>load<u32>(at);
      const q = <usize>load<u32>(at, 4);
      const r = <usize>load<u32>(at, 8);
      const s = <usize>load<u32>(at, 12);
      let hp = f64x2.splat(0);
      let hq = f64x2.splat(0);
      let hr = f64x2.splat(0);
      let hs = f64x2.splat(0);
      let i = (<usize>from) << 3;
      const end = (<usize>to) << 3;
      for (; i + 16 <= end; i += 16) {
        const x = v128.load(w + i);
        hp = f64x2.add(hp, f64x2.mul(v128.load(p + i), x));
        hq = f64x2.add(hq, f64x2.mul(v128.load(q + i), x));
        hr = f64x2.add(hr, f64x2.mul(v128.load(r + i), x));
        hs = f64x2.add(hs, f64x2.mul(v128.load(s + i), x));
      }
      let sp = f64x2.extract_lane(hp, 0) + f64x2.extract_lane(hp, 1);
      let sq = f64x2.extract_lane(hq, 0) + f64x2.extract_lane(hq, 1);
      let sr = f64x2.extract_lane(hr, 0) + f64x2.extract_lane(hr, 1);
      let ss = f64x2.extract_lane(hs, 0) + f64x2.extract_lane(hs, 1);
      for (; i < end; i += 8) {
        const x = load<f64>(w + i);
        sp += load<f64>(p + i) * x;
        sq += load<f64>(q + i) * x;
        sr += load<f64>(r + i) * x;
        ss += load<f64>(s + i) * x;
      }
      const to4 = h + ((<usize>c) << 3);
      store<f64>(to4, load<f64>(to4) + sp);
      store<f64>(to4, load<f64>(to4, 8) + sq, 8);
      store<f64>(to4, load<f64>(to4, 16) + sr, 16);
      store<f64>(to4, load<f64>(to4, 24) + ss, 24);
    }
    for (; c < count; c++) {
      const to1 = h + ((<usize>c) << 3);
      store<f64>(to1, load<f64>(to1) + dot(from, to, <usize>load<u32>(basis + ((<usize>c) << 2)), w));
    }
  }
}

/** w += Σ_c factor h_c basis_c. */
export function combine(lo: i32, hi: i32, basis: usize, count: i32, h: usize, factor: f64, w: usize): void {
  for (let from = lo; from < hi; from += ROUND) {
    const to = min(hi, from + ROUND);
    let c = 0;
    for (; c + 3 < count; c += 4) {
      const at = basis + ((<usize>c) << 2);
      const p = <usize>load<u32>(at);
      const q = <usize>load<u32>(at, 4);
      const r = <usize>load<u32>(at, 8);
      const s = <usize>load<u32>(at, 12);
      const from8 = h + ((<usize>c) << 3);
      const hp = factor * load<f64>(from8);
      const hq = factor * load<f64>(from8, 8);
      const hr = factor * load<f64>(from8, 16);
      const hs = factor * load<f64>(from8, 24);
      const vp = f64x2.splat(hp);
      const vq = f64x2.splat(hq);
      const vr = f64x2.splat(hr);
      const vs = f64x2.splat(hs);
      let i = (<usize>from) << 3;
      const end = (<usize>to) << 3;
      for (; i + 16 <= end; i += 16) {
        const one = f64x2.add(f64x2.mul(vp, v128.load(p + i)), f64x2.mul(vq, v128.load(q + i)));
        const two = f64x2.add(f64x2.mul(vr, v128.load(r + i)), f64x2.mul(vs, v128.load(s + i)));
        v128.store(w + i, f64x2.add(v128.load(w + i), f64x2.add(one, two)));
      }
      for (; i < end; i += 8) {
        store<f64>(
          w + i,
          load<f64>(w + i) +
            (hp * load<f64>(p + i) + hq * load<f64>(q + i) + (hr * load<f64>(r + i) + hs * load<f64>(s + i))),
        );
      }
    }
    for (; c < count; c++) {
      const p = <usize>load<u32>(basis + ((<usize>c) << 2));
      const f = factor * load<f64>(h + ((<usize>c) << 3));
      for (let i = (<usize>from) << 3; i < (<usize>to) << 3; i += 8)
        store<f64>(w + i, load<f64>(w + i) + f * load<f64>(p + i));
    }
  }
}

/**
 * The first `keep` vectors become Σ_j turn[r · count + j] basis_j, in place: every round of rows is gathered in
 * `scratch` (keep × ROUND doubles) first.
 */
export function rotate(
  lo: i32,
  hi: i32,
  basis: usize,
  count: i32,
  keep: i32,
  turn: usize,
  scratch: usize,
): void {
  for (let from = lo; from < hi; from += ROUND) {
    const to = min(hi, from + ROUND);
    const start = (<usize>from) << 3;
    const bytes = (<usize>(to - from)) << 3;
    for (let r = 0; r < keep; r++) {
      const own = scratch + ((<usize>(r * ROUND)) << 3);
      memory.fill(own, 0, bytes);
      // `combine` counts rows from lo, so the pointer is moved back by as many.
      combine(from, to, basis, count, turn + ((<usize>(r * count)) << 3), 1, own - start);
    }
    for (let r = 0; r < keep; r++)
      memory.copy(
        <usize>load<u32>(basis + ((<usize>r) << 2)) + start,
        scratch + ((<usize>(r * ROUND)) << 3),
        bytes,
      );
  }
}
