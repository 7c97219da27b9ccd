import type { RawMesh } from './parse/raw-mesh';

/** What a caller may lend the engine, which has no clock and no channel of its own. */
export interface AnalyseOptions {
  /** Called between stages, with the share of the whole work that is done (0 to 1). */
  onProgress?(stage: string, fraction: number): void;
  /** Asked between stages; true ends the run with UnusableInput code `stopped`. */
  shouldStop?(): boolean;
  /** The bytes as `loadMesh` read them; left out, `analyse` reads them itself. */
  mesh?: RawMesh;
  /** Leave out everything but geometry: the checks that rest on physics say so. */
  geometryOnly?: boolean;
  /** Form the sheet too: seconds more; left out, its check says so. */
  sheet?: boolean;
  /** How templates of this kind ended so far, one entry each: `{ pulls, failed }`; stands in the place of the estimated life. */
  pullLog?: unknown;
  /** Milliseconds; lent only to fill `timings`. */
  now?(): number;
}
