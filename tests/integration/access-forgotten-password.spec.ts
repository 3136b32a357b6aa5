import { once } from 'node:events';
import { createServer, type AddressInfo, type Socket } from 'node:net';
import { expect, it } from 'vitest';
import { Client } from '../harness/client.js';
import { startServer } from '../harness/server.js';

// The limit is what fails here: an answer that waited for the mail would take ten seconds.
it('"forgot password" is answered before any mail goes out: time does not tell whether there is an account', async () => {
  const sockets: Socket[] = [];
  const silent = createServer((socket) => sockets.push(socket));
  silent.listen(0, '127.0.0.1');
  await once(silent, 'listening');
  const { port } = silent.address() as AddressInfo;
  const server = await startServer({ SMTP_URL: `smtp://127.0.0.1:${port}` });
  const connected = once(silent, 'connection');
  try {
    await server.as('technician');
    const guest = new Client(server.url);
    for (const who of ['technician', 'nobody']) {
      const answer = await guest.call('POST', '/api/auth/forgot', { email: `${who}@pennywort.example` });
      expect(answer.status).toBe(204);
    }
    await connected;
  } finally {
    for (const socket of sockets) socket.destroy();
    silent.close();
    await server.close();
  }
}, 9000);
