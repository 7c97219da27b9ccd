import { spawn } from 'node:child_process';

/**
 * Runs a command to its end, quietly. A signal that ends us ends the command first.
 * @param {string[]} command program and arguments
 * @param {{ cwd?: string, env?: NodeJS.ProcessEnv, what: string }} options `what` names the work in an error
 * @returns {Promise<void>} rejects with the command's last words when it fails
 */
export function runCommand([program, ...args], { cwd, env, what }) {
  return new Promise((resolve, reject) => {
    const child = spawn(program, args, { cwd, env, stdio: ['ignore', 'pipe', 'pipe'] });
    let said = '';
    const keep = (chunk) => (said = (said + chunk).slice(-4000));
    child.stdout.on('data', keep);
    child.stderr.on('data', keep);
    const onSignal = (signal) => {
      child.kill(signal);
      // npm does not always listen.
      setTimeout(() => child.kill('SIGKILL'), 2000);
      child.once('close', () => process.exit(signal === 'SIGINT' ? 130 : 143));
    };
    const forget = () => ['SIGINT', 'SIGTERM'].forEach((signal) => process.off(signal, onSignal));
    ['SIGINT', 'SIGTERM'].forEach((signal) => process.once(signal, onSignal));
    child.once('error', (error) => {
      forget();
      reject(new Error(`${what} could not start: ${error.message}`));
    });
    child.once('close', (code, signal) => {
      forget();
      if (code === 0) resolve();
      else
        reject(new Error(`${what} ended with ${signal ?? `code ${code}`}. Its last words:\n${said.trim()}`));
    });
  });
}
