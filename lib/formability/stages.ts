import type { AnalyseOptions } from './analyse-options';
import { UnusableInput } from './unusable-input';

/** Share of the work, in the order of the stages; measured on a mesh of a million facets. */
const WEIGHT = {
  parse: 10,
  mesh: 40,
  columns: 15,
  vents: 5,
  air: 5,
  pits: 10,
  sort: 4,
  undercut: 10,
  facets: 10,
  walls: 8,
  draft: 12,
  sections: 10,
  sheet: 250,
  physics: 2,
  checks: 5,
  advice: 3,
  geometry: 2,
};
export type Stage = keyof typeof WEIGHT;

/** Runs stages one after another: progress, stop and, with a lent clock, timings. */
export class Stages {
  readonly timings: Record<string, number> = {};
  private done = 0;
  private readonly total: number;

  constructor(private readonly options: AnalyseOptions) {
    const sheet = options.sheet && !options.geometryOnly;
    this.total = TOTAL - (sheet ? 0 : WEIGHT.sheet);
  }

  run<T>(stage: Stage, work: (onProgress: (share: number) => void) => T): T {
    if (this.options.shouldStop?.()) {
      throw new UnusableInput('stopped', `the run was stopped before the stage "${stage}"; start it again`);
    }
    this.options.onProgress?.(stage, this.done / this.total);
    const began = this.options.now?.();
    const result = work((share) =>
      this.options.onProgress?.(stage, (this.done + share * WEIGHT[stage]) / this.total),
    );
    const ended = this.options.now?.();
    if (began !== undefined && ended !== undefined) this.timings[`${stage}Ms`] = ended - began;
    this.done += WEIGHT[stage];
    return result;
  }

  finish(): void {
    this.options.onProgress?.('done', 1);
  }
}

const TOTAL = Object.values(WEIGHT).reduce((sum, share) => sum + share, 0);
