import { createServer } from 'node:net';
import { LocalError } from './folders';

export const preferredPorts = {
  app: 3000,
  database: 5499,
  store: 9191,
  smtp: 1025,
  mail: 1080,
  realtime: 6011,
};
export type Ports = typeof preferredPorts;

const labels: Record<keyof Ports, string> = {
  app: 'application',
  database: 'database',
  store: 'object store',
  smtp: 'mail catcher',
  mail: 'mail page',
  realtime: 'realtime server',
};

/** Whether a server can listen there. Asks the kernel by listening: some servers share a port silently. */
export function portIsFree(port: number, host = '127.0.0.1'): Promise<boolean> {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(false));
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(true)));
  });
}

/** A port that the kernel picks. */
export function anyFreePort(host = '127.0.0.1'): Promise<number> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen({ port: 0, host }, () => {
      const { port } = probe.address() as { port: number };
      probe.close(() => resolve(port));
    });
  });
}

/**
 * Picks a port for each service: the preferred one, or the next free one with a line that says so.
 * @param wanted the application's port when PORT is set: that one or none
 * @throws {LocalError} names the port when the wanted one is taken or not a port
 */
export async function choosePorts(wanted: string | undefined, say: (line: string) => void): Promise<Ports> {
  const chosen = { ...preferredPorts };
  const used = new Set<number>();
  for (const name of Object.keys(preferredPorts) as (keyof Ports)[]) {
    const first = name === 'app' && wanted ? parsePort(wanted) : preferredPorts[name];
    let port = first;
    while (used.has(port) || !(await portIsFree(port))) {
      if (name === 'app' && wanted) {
        throw new LocalError(
          `PORT is ${port}, but another program listens on port ${port}. Choose another one.`,
        );
      }
      port += 1;
      if (port > first + 200)
        throw new LocalError(`No free port from ${first} to ${first + 200} for the ${labels[name]}.`);
    }
    if (port !== first) say(`Port ${first} is taken by another program; the ${labels[name]} uses ${port}.`);
    chosen[name] = port;
    used.add(port);
  }
  return chosen;
}

function parsePort(value: string): number {
  const port = Number(value);
  if (Number.isInteger(port) && port > 0 && port < 65_536) return port;
  throw new LocalError(`PORT is "${value}"; it must be a number from 1 to 65535.`);
}
