import { closeSync, openSync, readSync } from 'node:fs';
import { once } from 'node:events';
import { constants, setPriority } from 'node:os';
import { parentPort, workerData } from 'node:worker_threads';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import { LogAnalysis, type LogQuestion } from './analyse-log.js';
import { FirstDayFinder } from './first-day.js';
import type { EpochBatch, FromThread, LogTask } from './log-messages.js';

const CHUNK_BYTES = 256 * 1024;
/** Epochs that the server stores at once: bounds how long it is away from its sockets. */
const MOST_EPOCHS = 500;
/** Of the progress, what looking for a date may take: it goes through the whole file only when there is none. */
const FINDING = 0.25;

const task = workerData as LogTask;
const tell = (message: FromThread): void => parentPort!.postMessage(message, []);

/** Reads the file from its beginning; the bytes are good until the next are asked for. */
function* chunks(progressFrom: number, progressTo: number): Generator<Uint8Array> {
  const buffer = new Uint8Array(CHUNK_BYTES);
  const file = openSync(task.path, 'r');
  try {
    let [read, told] = [0, progressFrom];
    for (;;) {
      const length = readSync(file, buffer, 0, CHUNK_BYTES, null);
      if (length === 0) return;
      yield buffer.subarray(0, length);
      read += length;
      const progress = progressFrom + (progressTo - progressFrom) * Math.min(1, read / task.bytes);
      if (progress - told < 0.01) continue;
      told = progress;
      tell({ kind: 'progress', progress });
    }
  } finally {
    closeSync(file);
  }
}

function firstDay(): Pick<LogQuestion, 'firstDay' | 'hasDates'> {
  if (task.date !== null)
    return { firstDay: { day: Date.parse(task.date) / DAY_MS, from: 'given' }, hasDates: true };
  const finder = new FirstDayFinder(task.receivedAt);
  for (const chunk of chunks(0, FINDING)) if (finder.push(chunk)) break;
  return { firstDay: finder.finish(), hasDates: finder.hasDates };
}

/** One batch after the other, each once the one before is on disk. */
async function enter({ epochs, sigmas }: EpochBatch): Promise<void> {
  for (let at = 0; at < epochs.length || (at === 0 && sigmas.length > 0); at += MOST_EPOCHS) {
    const isLast = at + MOST_EPOCHS >= epochs.length;
    tell({ kind: 'epochs', epochs: epochs.slice(at, at + MOST_EPOCHS), sigmas: isLast ? sigmas : [] });
    await once(parentPort!, 'message');
  }
}

// On Linux this is of the calling thread alone: where processors are few, boards and rovers come first.
if (process.platform === 'linux') setPriority(0, constants.priority.PRIORITY_LOW);

const { receivedAt, limits, base, history } = task;
const analysis = new LogAnalysis({ ...firstDay(), receivedAt, limits, base, history });
for (const chunk of chunks(task.date === null ? FINDING : 0, 1)) await enter(analysis.push(chunk));
await enter(analysis.finish());
tell(analysis.answer());
parentPort!.close();
