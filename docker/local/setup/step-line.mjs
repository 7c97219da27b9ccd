/** Prints one line per step with the time it took: "  database ......... ready on port 5499 (1.2 s)". */
export function stepPrinter(out = process.stdout) {
  let open = false;
  const label = (name) => `  ${`${name} `.padEnd(22, '.')} `;

  /** Says something between steps without breaking a line in progress. */
  function note(text) {
    out.write(`${open ? '\n' : ''}  ${text.replaceAll('\n', '\n  ')}\n`);
    open = false;
  }

  /**
   * Runs `work` and prints how it went; `work` may return the words that describe the outcome.
   * @template T
   * @param {string} name
   * @param {() => Promise<T>} work
   * @param {(result: T) => string} describe
   * @returns {Promise<T>}
   */
  async function step(name, work, describe = () => 'ready') {
    const from = performance.now();
    out.write(label(name));
    open = true;
    try {
      const result = await work();
      const seconds = ((performance.now() - from) / 1000).toFixed(1);
      out.write(`${open ? '' : label(name)}${describe(result)} (${seconds} s)\n`);
      open = false;
      return result;
    } catch (error) {
      if (open) out.write('failed\n');
      open = false;
      throw error;
    }
  }
  return { step, note };
}
