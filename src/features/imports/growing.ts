/** A typed array that grows by doubling. */
export class Growing<T extends Int32Array | Float64Array | Uint16Array> {
  length = 0;
  constructor(
    private array: T,
    private readonly make: (size: number) => T,
  ) {}
  push(value: number): void {
    if (this.length === this.array.length) {
      const next = this.make(this.array.length * 2);
      next.set(this.array as never);
      this.array = next;
    }
    this.array[this.length++] = value;
  }
  view(): T {
    return this.array.subarray(0, this.length) as T;
  }
}
export const int32 = (size: number): Int32Array => new Int32Array(size);
export const float64 = (size: number): Float64Array => new Float64Array(size);
export const uint16 = (size: number): Uint16Array => new Uint16Array(size);
