/** A flat array that doubles as it fills, never beyond `limit` elements. */
export class Growing<T extends Float64Array | Uint32Array> {
  length = 0;

  constructor(
    public data: T,
    private readonly limit: number,
  ) {}

  /** Makes room for three more; false where the limit is reached. */
  room(): boolean {
    if (this.length + 3 <= this.data.length) return true;
    if (this.length + 3 > this.limit) return false;
    const larger = new (this.data.constructor as new (length: number) => T)(
      Math.min(this.limit, Math.max(192, 2 * this.data.length)),
    );
    larger.set(this.data);
    this.data = larger;
    return true;
  }

  view(): T {
    return this.data.subarray(0, this.length) as T;
  }
}
