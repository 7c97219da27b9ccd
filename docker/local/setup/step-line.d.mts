export interface StepPrinter {
  step<T>(name: string, work: () => Promise<T>, describe: (result: T) => string): Promise<T>;
  longStep<T>(
    name: string,
    doing: string,
    work: () => Promise<T>,
    describe: (result: T) => string,
  ): Promise<T>;
  note(text: string): void;
}
export function stepPrinter(out?: { write(text: string): unknown }): StepPrinter;
