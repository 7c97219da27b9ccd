type Step = <T>(name: string, work: () => Promise<T>, describe: (result: T) => string) => Promise<T>;

export interface StepPrinter {
  step: Step;
  longStep: Step;
  note(text: string): void;
}
export function stepPrinter(out?: { write(text: string): unknown }): StepPrinter;
