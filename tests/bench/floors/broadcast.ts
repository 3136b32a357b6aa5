// Bare node:http broadcast: each frame is serialised once and written to every reader.
import { createServer, type ServerResponse } from 'node:http';
import { laneFixtures } from '../lane-fixtures.js';

const lanes = laneFixtures(Number(process.argv[2]));
const readers = new Set<ServerResponse>();
const server = createServer((_request, response) => {
  response.writeHead(200, { 'content-type': 'text/event-stream', 'cache-control': 'no-store' });
  response.write(': hello\n\n');
  readers.add(response);
});
server.listen(0, '127.0.0.1', () => process.send!({ port: (server.address() as { port: number }).port }));
let sequence = 0;
process.on('message', (message: { frame?: boolean }) => {
  if (message.frame) {
    sequence++;
    const data = JSON.stringify({ serverTime: Date.now(), changes: lanes, lanes: [], gone: [] });
    const frame = Buffer.from(`id: ${sequence}\nevent: lanes\ndata: ${data}\n\n`);
    for (const reader of readers) reader.write(frame);
  }
  process.send!({ cpu: process.cpuUsage(), readers: readers.size });
});
