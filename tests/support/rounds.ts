/** How often a costly proof runs: `usual` in `npm test`, `whole` in `npm run test:hostile`. */
export const rounds = (usual: number, whole: number): number =>
  process.env.FIRSTPULL_HOSTILE === '1' ? whole : usual;
