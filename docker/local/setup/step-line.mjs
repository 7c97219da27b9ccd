/** Prints one line per step with the time it took: "  database ............. ready on port 5499 (1.2 s)". */
export function stepPrinter(out = process.stdout) {
  const line = (name, words) => out.write(`  ${`${name} `.padEnd(22, '.')} ${words}\n`);

  /** Says something between steps. */
  function note(text) {
    out.write(`  ${text.replaceAll('\n', '\n  ')}\n`);
  }

  /**
   * Runs `work` and prints how it went; steps may run side by side.
   * @template T
   * @param {string} name
   * @param {() => Promise<T>} work
   * @param {(result: T) => string} describe the words for the outcome
   * @returns {Promise<T>}
   */
  async function step(name, work, describe) {
    const from = performance.now();
    try {
      const result = await work();
      line(name, `${describe(result)} (${((performance.now() - from) / 1000).toFixed(1)} s)`);
      return result;
    } catch (error) {
      line(name, 'not done');
      throw error;
    }
  }

  /** The same for a step that may take long: says what it does when it is not done in a second. */
  async function longStep(name, doing, work, describe) {
    const timer = setTimeout(() => line(name, `${doing} …`), 1000);
    return step(name, () => work().finally(() => clearTimeout(timer)), describe);
  }
  return { step, longStep, note };
}
