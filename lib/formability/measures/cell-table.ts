/** Numbers kept for cells of space, by open addressing over three whole numbers; grows when half full. */
export class CellTable {
  private size = 1 << 12;
  private used = 0;
  private keys = new Int32Array(3 * this.size);
  private values = new Int32Array(this.size).fill(-1);

  /** The value kept for a key, which is `fresh` where there was none. */
  find(i: number, j: number, k: number, fresh: number): number {
    const mask = this.size - 1;
    let at = this.slot(i, j, k);
    while (this.values[at] >= 0) {
      if (this.keys[3 * at] === i && this.keys[3 * at + 1] === j && this.keys[3 * at + 2] === k) {
        return this.values[at];
      }
      at = (at + 1) & mask;
    }
    this.keys[3 * at] = i;
    this.keys[3 * at + 1] = j;
    this.keys[3 * at + 2] = k;
    this.values[at] = fresh;
    if (++this.used * 2 > this.size) this.grow();
    return fresh;
  }

  /** The value kept for a key, or −1. */
  get(i: number, j: number, k: number): number {
    const mask = this.size - 1;
    for (let at = this.slot(i, j, k); this.values[at] >= 0; at = (at + 1) & mask) {
      if (this.keys[3 * at] === i && this.keys[3 * at + 1] === j && this.keys[3 * at + 2] === k) {
        return this.values[at];
      }
    }
    return -1;
  }

  private slot(i: number, j: number, k: number): number {
    let h = Math.imul(i, 0x9e3779b1) ^ Math.imul(j, 0x85ebca6b) ^ Math.imul(k, 0xc2b2ae35);
    h ^= h >>> 15;
    h = Math.imul(h, 0x2c1b3c6d);
    return (h ^ (h >>> 12)) & (this.size - 1);
  }

  private grow(): void {
    const { keys, values, size } = this;
    this.size = size * 4;
    this.used = 0;
    this.keys = new Int32Array(3 * this.size);
    this.values = new Int32Array(this.size).fill(-1);
    for (let at = 0; at < size; at++) {
      if (values[at] >= 0) this.find(keys[3 * at], keys[3 * at + 1], keys[3 * at + 2], values[at]);
    }
  }
}
