/** Numbers below `limit` from a seed (xorshift). */
export function dice(seed: number): (limit: number) => number {
  let state = seed;
  return (limit) => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) % limit;
  };
}
