/** Which port a start takes; tried against sockets that really listen. */
import { once } from 'node:events';
import net from 'node:net';
import { choosePort, host, probePort } from '@/scripts/lib/ports';

const servers: net.Server[] = [];

async function occupy(port: number): Promise<number> {
  const server = net.createServer().listen(port, host);
  servers.push(server);
  await once(server, 'listening');
  const address = server.address();
  if (address === null || typeof address === 'string') throw new Error('not a port');
  return address.port;
}

afterEach(async () => {
  for (const server of servers.splice(0)) await once(server.close(), 'close');
});

test('a free port that is asked for is taken', async () => {
  const free = await probePort(0);
  expect(await choosePort(String(free))).toBe(free);
});

test('a port that is asked for and taken is refused in a sentence', async () => {
  const taken = await occupy(0);
  await expect(choosePort(String(taken))).rejects.toThrow(`Port ${taken} is taken`);
});

test('without a wish the next free port is taken', async () => {
  const first = await occupy(0);
  const chosen = await choosePort(undefined, first);
  expect(chosen).toBeGreaterThan(first);
  expect(await probePort(chosen)).toBe(chosen);
});

test.each(['0', '65536', '-1', '80.5', 'web', '0x50', ' 80'])(
  'PORT=%s is refused',
  async (text) => {
    await expect(choosePort(text)).rejects.toThrow('must be a whole number from 1 to 65535');
  },
);
