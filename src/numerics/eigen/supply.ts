/** Vectors of one length, handed out as zeros and taken back, so that a long search needs only so many. */
export class Supply {
  private readonly free: Float64Array[] = [];

  /** @param make a new vector of zeros, in whichever memory the products run fastest */
  constructor(private readonly make: () => Float64Array) {}

  take(): Float64Array {
    return this.free.pop()?.fill(0) ?? this.make();
  }

  give(...vectors: readonly Float64Array[]): void {
    this.free.push(...vectors);
  }
}
