// The whole application in a process of its own that watches itself: how late its event loop is, and how much memory it takes.
import { monitorEventLoopDelay } from 'node:perf_hooks';
import { startServer } from '../harness/server.js';

const server = await startServer();
const rover = await server.makeRover();
const technician = await server.as('technician');
const delay = monitorEventLoopDelay({ resolution: 10 });
delay.enable();
const rssMb = () => process.memoryUsage.rss() / 2 ** 20;
let peakMb = 0;
setInterval(() => {
  peakMb = Math.max(peakMb, rssMb());
}, 20);

process.on('message', (message: { restart?: boolean; close?: boolean }) => {
  if (message.close) {
    void server.close().then(() => process.send!({}));
    return;
  }
  const measured = { p99Ms: delay.percentile(99) / 1e6, maxMs: delay.max / 1e6, rssMb: rssMb(), peakMb };
  if (message.restart) {
    delay.reset();
    peakMb = 0;
  }
  process.send!(measured);
});
process.once('disconnect', () => process.exit());
process.send!({
  port: Number(new URL(server.url).port),
  cookie: technician.cookieHeader,
  roverId: rover.id,
});
