import { createServer, type AddressInfo, type Server } from 'node:net';
import { afterEach, describe, expect, it } from 'vitest';
import { anyFreePort, choosePorts, portIsFree, preferredPorts } from '@/docker/local/ports';

const open: Server[] = [];
async function occupy(port: number, host = '127.0.0.1'): Promise<number> {
  const server = createServer();
  open.push(server);
  await new Promise<void>((resolve, reject) => server.once('error', reject).listen(port, host, resolve));
  return (server.address() as AddressInfo).port;
}
afterEach(async () => {
  await Promise.all(open.splice(0).map((server) => new Promise((resolve) => server.close(resolve))));
});

describe('ports', () => {
  it('sees a port that is taken, also when it is taken on all addresses', async () => {
    expect(await portIsFree(await occupy(0))).toBe(false);
    expect(await portIsFree(await occupy(0, '0.0.0.0'))).toBe(false);
    expect(await portIsFree(await anyFreePort())).toBe(true);
  });

  it('avoids taken ports, says so, and never gives one port twice', async () => {
    const said: string[] = [];
    if (await portIsFree(preferredPorts.realtime)) await occupy(preferredPorts.realtime);
    const ports = await choosePorts(undefined, (line) => said.push(line));
    expect(ports.realtime).toBeGreaterThan(preferredPorts.realtime);
    expect(said).toContain(
      `Port ${preferredPorts.realtime} is taken by another program; the realtime server uses ${ports.realtime}.`,
    );
    expect(new Set(Object.values(ports)).size).toBe(6);
    expect(await Promise.all(Object.values(ports).map((port) => portIsFree(port)))).not.toContain(false);
  });

  it('takes the port that PORT names, or none', async () => {
    const free = await anyFreePort();
    expect((await choosePorts(String(free), () => undefined)).app).toBe(free);
    const taken = await occupy(0);
    await expect(choosePorts(String(taken), () => undefined)).rejects.toThrow(
      `PORT is ${taken}, but another program`,
    );
    await expect(choosePorts('many', () => undefined)).rejects.toThrow('PORT is "many"; it must be a number');
  });
});
