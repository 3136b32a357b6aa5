// Bare node:net: checksum, GGA read, stored in groups. The first line says the rover.
import { createServer } from 'node:net';
import { readAll } from './read-gga.js';
import { FloorStore } from './store.js';

const store = new FloorStore(process.argv[2]!);
const server = createServer((socket) => {
  let rover = 0;
  let rest = '';
  socket.setEncoding('latin1');
  socket.on('data', (chunk: string) => {
    const text = rest + chunk;
    const end = text.lastIndexOf('\n') + 1;
    rest = text.slice(end);
    let body = text.slice(0, end);
    if (rover === 0 && body.startsWith('KEY ')) {
      rover = Number(/^KEY (\d+)/.exec(body)![1]);
      body = body.slice(body.indexOf('\n') + 1);
    }
    const rows = readAll(body, rover);
    if (rows.length > 0) store.add(rows, () => undefined);
  });
});
server.listen(0, '127.0.0.1', () => process.send!({ port: (server.address() as { port: number }).port }));
process.on('message', () => process.send!({ stored: store.stored }));
