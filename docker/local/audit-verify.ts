// `npm run audit:verify`: with the environment of a deployment as it is, otherwise on the local run of this data folder.
import { spawn } from 'node:child_process';
import path from 'node:path';
import { dataFolderPath, LocalError, root } from './folders';
import { runningEnvironment } from './running-environment';
import { typescriptCommand } from './node-command';

function environment(): Record<string, string | undefined> {
  if (process.env.DATABASE_URL) return process.env;
  return { ...process.env, ...runningEnvironment(dataFolderPath()), LOG_LEVEL: 'warn' };
}

try {
  const command = path.join(root, 'lib/audit/verify-command.ts');
  const [program, ...args] = typescriptCommand(command, ...process.argv.slice(2));
  const child = spawn(program, args, { env: environment() as NodeJS.ProcessEnv, stdio: 'inherit' });
  child.once('error', (error) => {
    console.error(`The audit could not be verified: ${error.message}`);
    process.exitCode = 2;
  });
  child.once('close', (code) => (process.exitCode = code ?? 2));
} catch (error) {
  if (!(error instanceof LocalError)) throw error;
  console.error(error.message);
  process.exitCode = 2;
}
