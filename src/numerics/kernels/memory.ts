import { instantiate, type Kernels } from './module';
import { SecondThread } from './second-thread';

/** From this many stored entries a second thread gains more than waking it costs (about 20,000 members). */
const SHARED_FROM = 200_000;
const PAGE = 65_536;
/** As many pages as 32 bits address; what needs more is made outside. */
const MOST_PAGES = 65_536;
const LEAST_PAGES = 64;
const HALF = 2;

/** Where the kernels' small inputs and outputs stand: pointers, coefficients, sums. */
const SLOTS = 4_096;

const owners = new WeakMap<ArrayBufferLike, KernelMemory>();

/** The pages asked for, or as many as there are. */
function allocate(asked: number): WebAssembly.Memory {
  for (let pages = Math.min(asked, MOST_PAGES); ; pages = Math.ceil(pages / 2))
    try {
      return new WebAssembly.Memory({ initial: pages, maximum: pages, shared: true });
    } catch (error) {
      // Fewer arrays fit then, and the rest take the plain path.
      if (pages < LEAST_PAGES) throw error;
    }
}

/**
 * A memory of fixed size that WebAssembly kernels work in, alone or in two threads. Arrays are handed out and never
 * taken back; the whole goes when nothing refers to it. Rows are always split at the same place, and partial
 * sums added in the same order, so that one and two threads give the same bytes.
 */
export class KernelMemory {
  private readonly memory: WebAssembly.Memory;
  private readonly kernels: Kernels;
  private readonly second: SecondThread | null;
  private top = 0;
  private middle: number;
  /** Coefficients and partial sums; the second half of the sums belongs to the second half of the rows. */
  private readonly slots: Float64Array;
  private readonly pointers: Uint32Array;
  private scratch: Float64Array | null = null;

  /**
   * @param rows vectors' length
   * @param bytes what will be asked for at most; what no longer fits is made outside, for the plain path
   * @param entries stored entries of the matrix, by which the second thread is worth its while or not
   */
  constructor(
    readonly rows: number,
    bytes: number,
    entries: number,
  ) {
    this.memory = allocate(Math.ceil((bytes + (3 * SLOTS + SLOTS) * 8) / PAGE) + 2);
    this.kernels = instantiate(this.memory);
    this.second = entries >= SHARED_FROM ? SecondThread.start(this.memory) : null;
    owners.set(this.memory.buffer, this);
    this.middle = rows >> 1;
    this.slots = this.take(3 * SLOTS) as Float64Array<SharedArrayBuffer>;
    this.pointers = new Uint32Array(this.memory.buffer, this.reserve(SLOTS * 4)!, SLOTS);
  }

  /** The memory that an array lies in, if it lies in one. */
  static of(array: Float64Array): KernelMemory | null {
    return owners.get(array.buffer) ?? null;
  }

  /** Whether all arrays lie here. */
  holds(...arrays: readonly Float64Array[]): boolean {
    return arrays.every((one) => one.buffer === this.memory.buffer);
  }

  /** Whether the first `count` vectors lie here. */
  holdsAll(vectors: readonly Float64Array[], count: number): boolean {
    for (let c = 0; c < count; c++) if (vectors[c]!.buffer !== this.memory.buffer) return false;
    return count <= SLOTS;
  }

  private reserve(bytes: number): number | null {
    const at = this.top;
    const next = at + Math.ceil(bytes / 64) * 64;
    if (next > this.memory.buffer.byteLength) return null;
    this.top = next;
    return at;
  }

  /** `length` zeros; outside the memory when it is full. */
  take(length: number): Float64Array {
    const at = this.reserve(length * 8);
    return at === null ? new Float64Array(length) : new Float64Array(this.memory.buffer, at, length);
  }

  /** A copy of whole numbers, or null when the memory is full. */
  keepInts(source: Int32Array): Int32Array | null {
    const at = this.reserve(source.length * 4);
    if (at === null) return null;
    const copy = new Int32Array(this.memory.buffer, at, source.length);
    copy.set(source);
    return copy;
  }

  /** Splits the rows where half of the stored entries lie, so that both threads have as much to do. */
  balance(offsets: Int32Array): void {
    const half = offsets[this.rows]! / 2;
    let row = 0;
    while (row < this.rows && offsets[row]! < half) row++;
    this.middle = row;
  }

  /** Runs a kernel on both halves of the rows; `second` are its arguments where they differ. */
  private both(name: keyof Kernels, first: readonly number[], second = first): void {
    const call = this.kernels[name] as (...args: number[]) => void;
    if (this.second) {
      this.second.begin(name, [this.middle, this.rows, ...second]);
      call(0, this.middle, ...first);
      this.second.wait();
    } else {
      call(0, this.middle, ...first);
      call(this.middle, this.rows, ...second);
    }
  }

  /** The place of the results of one half; the two lie `SLOTS` doubles apart. */
  private sumsAt(half: number): number {
    return this.slots.byteOffset + (1 + half) * SLOTS * 8;
  }

  private sum(at: number): number {
    return this.slots[SLOTS + at]! + this.slots[HALF * SLOTS + at]!;
  }

  private point(basis: readonly Float64Array[], count: number): void {
    for (let c = 0; c < count; c++) this.pointers[c] = basis[c]!.byteOffset;
  }

  dot(x: Float64Array, y: Float64Array): number {
    this.pointers[0] = x.byteOffset;
    this.both(
      'project',
      [this.pointers.byteOffset, 1, y.byteOffset, this.sumsAt(0)],
      [this.pointers.byteOffset, 1, y.byteOffset, this.sumsAt(1)],
    );
    return this.sum(0);
  }

  /** h_c = basis_cᵀ w for c < count ≤ 4,096. */
  project(basis: readonly Float64Array[], count: number, w: Float64Array, h: Float64Array): void {
    this.point(basis, count);
    this.both(
      'project',
      [this.pointers.byteOffset, count, w.byteOffset, this.sumsAt(0)],
      [this.pointers.byteOffset, count, w.byteOffset, this.sumsAt(1)],
    );
    for (let c = 0; c < count; c++) h[c] = this.sum(c);
  }

  /** w ← w + factor · Σ_c h_c basis_c. */
  combine(
    basis: readonly Float64Array[],
    count: number,
    h: ArrayLike<number>,
    factor: number,
    w: Float64Array,
  ): void {
    this.point(basis, count);
    for (let c = 0; c < count; c++) this.slots[c] = h[c]!;
    this.both('combine', [this.pointers.byteOffset, count, this.slots.byteOffset, factor, w.byteOffset]);
  }

  /** basis_r ← Σ_j turn[r · count + j] basis_j for r < keep, in place; false when there is no room for it. */
  rotate(basis: readonly Float64Array[], count: number, keep: number, turn: Float64Array): boolean {
    // ROUND of the kernel, for either half.
    const share = keep * 1_024;
    const need = keep * count + 2 * share;
    if (!this.scratch || this.scratch.length < need) {
      const taken = this.take(need);
      if (!this.holds(taken)) return false;
      this.scratch = taken;
    }
    this.scratch.set(turn.subarray(0, keep * count), 2 * share);
    this.point(basis, count);
    const at = this.scratch.byteOffset;
    const args = [this.pointers.byteOffset, count, keep, at + 2 * share * 8];
    this.both('rotate', [...args, at], [...args, at + share * 8]);
    return true;
  }

  /** See `rows` in the kernels' source. */
  product(matrix: KeptMatrix, x: Float64Array, z: Float64Array, by: Factors, out: Float64Array): void {
    this.both('rows', [
      matrix.offsets.byteOffset,
      matrix.targets.byteOffset,
      matrix.values.byteOffset,
      matrix.diagonal.byteOffset,
      matrix.scale.byteOffset,
      x.byteOffset,
      z.byteOffset,
      by.alpha,
      by.beta,
      by.gamma,
      by.shift,
      out.byteOffset,
    ]);
  }

  /**
   * out = (diag(own) + α S) x for eight vectors side by side, S the matrix less its rank-one part `rankOne` scale scaleᵀ;
   * dots_v = xᵀ out.
   */
  shifted8(
    matrix: KeptMatrix,
    own: Float64Array,
    alpha: number,
    rankOne: number,
    x: Float64Array,
    out: Float64Array,
    dots: Float64Array,
  ): void {
    if (rankOne !== 0) {
      const args = [matrix.scale.byteOffset, x.byteOffset];
      this.both('weigh8', [...args, this.sumsAt(0)], [...args, this.sumsAt(1)]);
    }
    for (let v = 0; v < 8; v++) this.slots[v] = rankOne === 0 ? 0 : rankOne * this.sum(v);
    const args = [
      matrix.offsets.byteOffset,
      matrix.targets.byteOffset,
      matrix.values.byteOffset,
      matrix.diagonal.byteOffset,
      matrix.scale.byteOffset,
      own.byteOffset,
      x.byteOffset,
      alpha,
      this.slots.byteOffset,
      out.byteOffset,
    ];
    this.both('rows8', [...args, this.sumsAt(0)], [...args, this.sumsAt(1)]);
    for (let v = 0; v < 8; v++) dots[v] = this.sum(v);
  }

  /** See `advance8` in the kernels' source. */
  advance8(
    step: Float64Array,
    inverse: Float64Array,
    p: Float64Array,
    q: Float64Array,
    x: Float64Array,
    r: Float64Array,
    sums: Float64Array,
  ): void {
    this.slots.set(step);
    const args = [this.slots, inverse, p, q, x, r].map((one) => one.byteOffset);
    this.both('advance8', [...args, this.sumsAt(0)], [...args, this.sumsAt(1)]);
    for (let v = 0; v < 16; v++) sums[v] = this.sum(v);
  }

  /** See `direct8` in the kernels' source. */
  direct8(factor: Float64Array, inverse: Float64Array, r: Float64Array, p: Float64Array): void {
    this.slots.set(factor);
    this.both(
      'direct8',
      [this.slots, inverse, r, p].map((one) => one.byteOffset),
    );
  }

  /** Ends the second thread. */
  close(): void {
    void this.second?.end();
  }
}

export interface Factors {
  readonly alpha: number;
  readonly beta: number;
  readonly gamma: number;
  readonly shift: number;
}

/** A Laplacian's arrays within a kernel memory. */
export interface KeptMatrix {
  readonly offsets: Int32Array;
  readonly targets: Int32Array;
  readonly values: Float64Array;
  readonly diagonal: Float64Array;
  readonly scale: Float64Array;
}
