import { LocalError } from './folders';
import { readHolder } from './lock';
import { productEnvironment } from './product-environment';
import { openSecrets } from './secrets';

/**
 * The variables of lib/env for the product that runs on this data folder now, for a command in a second terminal.
 * @throws {LocalError} when none runs there, or when it is still starting
 */
export function runningEnvironment(dataFolder: string): Record<string, string> {
  const running = readHolder(dataFolder);
  if (!running)
    throw new LocalError(
      `Firstpull does not run on ${dataFolder}. Start it with "npm start" and run this in a second terminal, ` +
        'or set the variables of a deployment (README.md names them).',
    );
  if (!running.ports)
    throw new LocalError(`Firstpull is still starting on ${dataFolder}. Run this again when it is up.`);
  return productEnvironment(running.ports, openSecrets(dataFolder), { dev: false, demo: true }).worker;
}
