import { rmSync } from 'node:fs';
import { signalGroup } from '@/docker/local/process-identity';
import type { Service } from '@/docker/local/service';

/** Should the test run be broken off, nothing that it started stays behind. */
export function endWithProcess(started: Service[], folder: string): void {
  process.once('exit', () => {
    for (const service of started) {
      const pid = service.pid();
      if (pid) signalGroup(pid, 'SIGKILL');
    }
    rmSync(folder, { recursive: true, force: true });
  });
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP'] as const) process.once(signal, () => process.exit(1));
}
