/**
 * out = (diag − S) X for `width` vectors stored interleaved, x[i · width + v]: each entry of the matrix is read once
 * for all of them.
 */
export function blockRows(
  offsets: Int32Array,
  targets: Int32Array,
  values: Float64Array,
  diagonal: Float64Array,
  x: Float64Array,
  width: number,
  out: Float64Array,
): void {
  const n = diagonal.length;
  for (let i = 0; i < n; i++) {
    const at = i * width;
    const d = diagonal[i]!;
    for (let v = 0; v < width; v++) out[at + v] = d * x[at + v]!;
    for (let p = offsets[i]!, end = offsets[i + 1]!; p < end; p++) {
      const w = values[p]!;
      const from = targets[p]! * width;
      for (let v = 0; v < width; v++) out[at + v]! -= w * x[from + v]!;
    }
  }
}

/** The same for eight vectors, with the sums of a row in registers. */
export function blockRows8(
  offsets: Int32Array,
  targets: Int32Array,
  values: Float64Array,
  diagonal: Float64Array,
  x: Float64Array,
  out: Float64Array,
): void {
  const n = diagonal.length;
  for (let i = 0; i < n; i++) {
    let a = 0;
    let b = 0;
    let c = 0;
    let d = 0;
    let e = 0;
    let f = 0;
    let g = 0;
    let h = 0;
    for (let p = offsets[i]!, end = offsets[i + 1]!; p < end; p++) {
      const w = values[p]!;
      const q = targets[p]! * 8;
      a += w * x[q]!;
      b += w * x[q + 1]!;
      c += w * x[q + 2]!;
      d += w * x[q + 3]!;
      e += w * x[q + 4]!;
      f += w * x[q + 5]!;
      g += w * x[q + 6]!;
      h += w * x[q + 7]!;
    }
    const at = i * 8;
    const own = diagonal[i]!;
    out[at] = own * x[at]! - a;
    out[at + 1] = own * x[at + 1]! - b;
    out[at + 2] = own * x[at + 2]! - c;
    out[at + 3] = own * x[at + 3]! - d;
    out[at + 4] = own * x[at + 4]! - e;
    out[at + 5] = own * x[at + 5]! - f;
    out[at + 6] = own * x[at + 6]! - g;
    out[at + 7] = own * x[at + 7]! - h;
  }
}
