// Bare node:http that reads sentences and stores them in groups; the answer goes out after the commit.
import { createServer } from 'node:http';
import { readAll } from './read-gga.js';
import { FloorStore } from './store.js';

const store = new FloorStore(process.argv[2]!);
const server = createServer((request, response) => {
  const rover = Number(request.headers.authorization!.slice(7));
  let body = '';
  request.setEncoding('latin1');
  request.on('data', (chunk: string) => {
    body += chunk;
  });
  request.on('end', () => {
    const rows = readAll(body, rover);
    store.add(rows, () => {
      const answer = JSON.stringify({ accepted: rows.length });
      response.writeHead(200, { 'content-type': 'application/json', 'content-length': answer.length });
      response.end(answer);
    });
  });
});
server.listen(0, '127.0.0.1', () => process.send!({ port: (server.address() as { port: number }).port }));
process.on('message', () => process.send!({ stored: store.stored }));
