import type { Grid } from './grid';

/**
 * Priority flood from the grid's rim (R. Barnes, C. Lehman, D. Mulla, Computers & Geosciences 62 (2014) 117–127,
 * improved variant with a plain queue for cells that are already under water): the level that water, poured over
 * the surface with the bed closed, would stand at. 8 neighbours.
 * @param surface nx·ny heights
 */
export function floodSurface(surface: Float64Array, grid: Grid): Float64Array {
  const { nx, ny } = grid;
  const cells = nx * ny;
  const level = new Float64Array(cells);
  const done = new Uint8Array(cells);
  const heap = new Heap(surface.length);
  const queue = new Int32Array(cells);
  let head = 0;
  let tail = 0;
  const seed = (c: number) => {
    if (done[c]) return;
    done[c] = 1;
    level[c] = surface[c];
    // The bed round the part is the lowest there is: such cells need no order among themselves.
    if (surface[c] <= 0) queue[tail++] = c;
    else heap.push(c, surface[c]);
  };
  for (let i = 0; i < nx; i++) {
    seed(i);
    seed((ny - 1) * nx + i);
  }
  for (let j = 0; j < ny; j++) {
    seed(j * nx);
    seed(j * nx + nx - 1);
  }
  while (head < tail || heap.size > 0) {
    const c = head < tail ? queue[head++] : heap.pop();
    const here = level[c];
    const i = c % nx;
    const fromX = i > 0 ? -1 : 0;
    const toX = i + 1 < nx ? 1 : 0;
    const fromY = c >= nx ? -nx : 0;
    const toY = c < cells - nx ? nx : 0;
    for (let dy = fromY; dy <= toY; dy += nx) {
      for (let dx = fromX; dx <= toX; dx++) {
        const n = c + dy + dx;
        if (done[n]) continue;
        done[n] = 1;
        const height = surface[n];
        if (height <= here) {
          level[n] = here;
          queue[tail++] = n;
        } else {
          level[n] = height;
          heap.push(n, height);
        }
      }
    }
  }
  return level;
}

/** Binary heap of cells by height; equal heights by cell number, so the order is one. */
class Heap {
  size = 0;
  private readonly cell: Int32Array;
  private readonly key: Float64Array;

  constructor(capacity: number) {
    this.cell = new Int32Array(capacity);
    this.key = new Float64Array(capacity);
  }

  push(cell: number, key: number): void {
    const { cell: cells, key: keys } = this;
    let at = this.size++;
    while (at > 0) {
      const parent = (at - 1) >> 1;
      if (keys[parent] < key || (keys[parent] === key && cells[parent] < cell)) break;
      keys[at] = keys[parent];
      cells[at] = cells[parent];
      at = parent;
    }
    keys[at] = key;
    cells[at] = cell;
  }

  pop(): number {
    const { cell: cells, key: keys } = this;
    const top = cells[0];
    const last = --this.size;
    const cell = cells[last];
    const key = keys[last];
    let at = 0;
    for (;;) {
      let child = 2 * at + 1;
      if (child >= last) break;
      const right = child + 1;
      if (
        right < last &&
        (keys[right] < keys[child] || (keys[right] === keys[child] && cells[right] < cells[child]))
      ) {
        child = right;
      }
      if (key < keys[child] || (key === keys[child] && cell < cells[child])) break;
      keys[at] = keys[child];
      cells[at] = cells[child];
      at = child;
    }
    keys[at] = key;
    cells[at] = cell;
    return top;
  }
}
