// Our hub with lanes that stand still, on a bare node:http server: what a frame costs once it is to be sent.
import { createServer } from 'node:http';
import { nothingMoved } from '@hubtack/backend/board/frame.js';
import { StreamHub } from '@hubtack/backend/board/stream.hub.js';
import { StreamReader } from '@hubtack/backend/board/stream.reader.js';
import { MetricsService } from '@hubtack/backend/metrics/metrics.service.js';
import { laneFixtures } from './lane-fixtures.js';

const lanes = new Map(laneFixtures(Number(process.argv[2])).map((lane) => [lane.id, lane]));
const hub = new StreamHub(
  { crewId: () => null, change: (id) => lanes.get(id), lane: () => undefined },
  { lostFixes: () => [] },
  new MetricsService(),
);
let readers = 0;
const server = createServer((_request, response) => {
  response.writeHead(200, { 'content-type': 'text/event-stream', 'cache-control': 'no-store' });
  const reader = new StreamReader(response as never, 'office', 'bench', null, Infinity, (slow) =>
    hub.drained(slow, Date.now()),
  );
  hub.join(reader, hub.cursor, Date.now());
  readers++;
});
server.listen(0, '127.0.0.1', () => process.send!({ port: (server.address() as { port: number }).port }));
process.on('message', (message: { frame?: boolean }) => {
  if (message.frame) {
    const moved = nothingMoved();
    for (const id of lanes.keys()) moved.changed.add(id);
    hub.publish(moved, new Set(), Date.now());
  }
  process.send!({ cpu: process.cpuUsage(), readers });
});
