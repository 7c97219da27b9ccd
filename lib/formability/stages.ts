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
  checks: 5,
  advice: 3,
  geometry: 2,
};
export type Stage = keyof typeof WEIGHT;

/** Runs stages one after another: progress, stop and, with a lent clock, timings. */
export class Stages {
  readonly timings: Record<string, number> = {};
  private done = 0;

  constructor(private readonly options: AnalyseOptions) {}

  run<T>(stage: Stage, work: () => T): T {
    if (this.options.shouldStop?.()) {
      throw new UnusableInput('stopped', `the run was stopped before the stage "${stage}"; start it again`);
    }
    this.options.onProgress?.(stage, this.done / TOTAL);
    const began = this.options.now?.();
    const result = work();
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
