import { closeSync, openSync, writeSync } from 'node:fs';
import { SimulatedRover } from '@hubtack/simulators/fleet/simulated-rover.js';
import { scenarios } from '@hubtack/simulators/scenarios/scenarios.js';

const SITE = { latitude: -41.44, longitude: 147.14 };
/** The crew of the demo that works under trees. */
const CREW = 3;

/** Writes a log of a simulated rover, GGA, GST and RMC once a second, of at most so many bytes; answers how many epochs. */
export function writeLog(path: string, bytes: number, endAt: number): number {
  const { behaviours } = scenarios.demo(1)(CREW);
  const rover = new SimulatedRover(SITE, behaviours, 1);
  const file = openSync(path, 'w');
  const secondsOf = Math.ceil(bytes / 200);
  const startAt = Math.floor(endAt / 1000 - secondsOf) * 1000;
  let [written, epochs, pending] = [0, 0, ''];
  for (let second = 0; ; second++) {
    const text = rover.sentencesAt(startAt + second * 1000, second);
    if (written + text.length > bytes) break;
    written += text.length;
    if (text !== '') epochs++;
    pending += text;
    if (pending.length < 1_000_000) continue;
    writeSync(file, pending, null, 'latin1');
    pending = '';
  }
  writeSync(file, pending, null, 'latin1');
  closeSync(file);
  return epochs;
}
