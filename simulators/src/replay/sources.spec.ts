import { createServer, type AddressInfo, type Socket } from 'node:net';
import { expect, it } from 'vitest';
import { tcpSource } from './sources.js';

it('a receiver that goes away is read again when it is back, until somebody says stop', async () => {
  const stop = new AbortController();
  const lost: string[] = [];
  let visits = 0;
  const open = new Set<Socket>();
  const receiver = createServer((socket) => {
    visits++;
    open.add(socket);
    socket.on('error', () => undefined);
    if (visits === 3) socket.write('third;');
    // The first and second time it goes away, once in order and once not.
    else if (visits === 1) socket.end('first;');
    else socket.resetAndDestroy();
  });
  await new Promise<void>((resolve) => {
    receiver.listen(0, '127.0.0.1', resolve);
  });
  const { port } = receiver.address() as AddressInfo;
  const source = tcpSource('127.0.0.1', port, {
    stop: stop.signal,
    onLost: (why) => lost.push(why),
    againMs: 1,
  });
  let read = '';
  for await (const chunk of source.bytes) {
    read += Buffer.from(chunk).toString();
    if (read.includes('third')) stop.abort();
  }
  expect([source.live, read, visits, lost.length]).toEqual([true, 'first;third;', 3, 1]);
  for (const socket of open) socket.destroy();
  receiver.close();
});
