/** Prints one line per step with the time it took: "  database ............. ready on port 5499 (1.2 s)". */
export function stepPrinter(out = process.stdout) {
  let open = '';
  const label = (name) => `  ${`${name} `.padEnd(22, '.')} `;

  /** Says something between steps without breaking a line in progress. */
  function note(text) {
    out.write(`${open ? '\n' : ''}  ${text.replaceAll('\n', '\n  ')}\n`);
    open = '';
  }

  function finish(name, words) {
    if (open === name) {
      out.write(`${words}\n`);
      open = '';
    } else {
      note(`${label(name)}${words}`.trimStart());
    }
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
      finish(name, `${describe(result)} (${((performance.now() - from) / 1000).toFixed(1)} s)`);
      return result;
    } catch (error) {
      finish(name, 'failed');
      throw error;
    }
  }

  /** The same for a step that may take long: its name is shown while it runs. */
  function longStep(name, work, describe) {
    out.write(`${open ? '\n' : ''}${label(name)}`);
    open = name;
    return step(name, work, describe);
  }
  return { step, longStep, note };
}
