import { createHash } from 'node:crypto';
import { join } from 'node:path';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import { z } from 'zod';
import { readOptions } from '../cli/options.js';
import { claimFolder } from './claim-folder.js';
import { forward, type Sent } from './forwarder.js';
import { LineSplitter } from './line-splitter.js';
import { firstDayOf } from './line-time.js';
import type { Post } from './post-builder.js';
import { replay } from './replay.js';
import { fileSource, headOf, serialSource, stdinSource, tcpSource, type Source } from './sources.js';
import { Spool } from './spool.js';
import { openTcpSink } from './tcp-sink.js';

const usage = `The sender: replays a log, or carries a live receiver's output to the server.

  npm run replay -- --file LOG [--date YYYY-MM-DD] [--speed X|max] --url URL --key KEY
  npm run replay -- --tcp HOST:PORT   --url URL --key KEY     reads a receiver over TCP
  npm run replay -- --serial DEVICE [--baud 115200] --url URL --key KEY
  npm run replay -- -                 --url URL --key KEY     reads standard input

  --to-tcp HOST:PORT   instead of --url: hands over to the server's plain TCP port (nothing is kept for later)
  --spool FOLDER       where sentences wait while the server is away (default var/spool/<part of the key's hash>)

Sentences are on disk before they are sent, and forwarded in order when the server is back.`;

const hostAndPort = z.string().regex(/^[^:\s]+:\d{1,5}$/, 'write HOST:PORT');
const options = readOptions(
  usage,
  {
    file: { type: 'string' },
    tcp: { type: 'string' },
    serial: { type: 'string' },
    baud: { type: 'string' },
    date: { type: 'string' },
    speed: { type: 'string' },
    url: { type: 'string' },
    'to-tcp': { type: 'string' },
    key: { type: 'string' },
    spool: { type: 'string' },
  },
  z
    .object({
      file: z.string().optional(),
      tcp: hostAndPort.optional(),
      serial: z.string().optional(),
      baud: z.coerce.number().int().positive().default(115_200),
      date: z.iso.date('write YYYY-MM-DD').optional(),
      speed: z
        .string()
        .transform((text) => (text === 'max' ? Infinity : Number(text)))
        .refine((factor) => factor > 0, 'write a number above 0, or max')
        .default(1),
      url: z.url().optional(),
      'to-tcp': hostAndPort.optional(),
      key: z.string('say the rover key').min(1, 'say the rover key'),
      spool: z.string().optional(),
      positionals: z.array(z.literal('-', 'write - for standard input, and nothing else without an option')),
    })
    .refine(
      (given) =>
        [given.file, given.tcp, given.serial, given.positionals[0] === '-' || undefined].filter(Boolean)
          .length === 1,
      { message: 'say one source: --file, --tcp, --serial or -', path: ['file'] },
    )
    .refine((given) => (given.url === undefined) !== (given['to-tcp'] === undefined), {
      message: 'say --url or --to-tcp',
      path: ['url'],
    }),
);

const split = (text: string): [string, number] => [text.split(':')[0]!, Number(text.split(':')[1])];

/** How long a stopped sender goes on sending what it has. */
const LAST_TRIES_MS = 3000;

const stopReading = new AbortController();
const stopSending = new AbortController();
for (const signal of ['SIGINT', 'SIGTERM'] as const)
  process.once(signal, () => {
    stopReading.abort();
    setTimeout(() => stopSending.abort(), LAST_TRIES_MS).unref();
  });
const stop = stopReading.signal;

async function openSource(): Promise<Source> {
  const receiver = (name: string) => ({
    stop,
    onLost: (why: string) => console.error(`${name} is gone (${why}); it is looked for until it is back`),
  });
  if (options.file) return fileSource(options.file, stop);
  if (options.tcp) return tcpSource(...split(options.tcp), receiver(options.tcp));
  if (options.serial) return serialSource(options.serial, options.baud, receiver(options.serial));
  return stdinSource(stop);
}

function firstDay(): number | null {
  if (options.date) return Date.parse(options.date) / DAY_MS;
  if (!options.file) return null;
  const day = firstDayOf(new LineSplitter().push(headOf(options.file)));
  if (day === null)
    console.error(
      'No date in this log, so its times are taken for the nearest to now. If that is wrong, say --date, the UTC date of its first sentence.',
    );
  return day;
}

function report(sent: Sent): void {
  const { posts, accepted, duplicates, ignored, rejected } = sent;
  console.log(
    `${posts} posts: ${accepted} accepted, ${duplicates} duplicates, ${ignored} ignored, ${rejected} rejected`,
  );
  for (const [reason, count] of sent.reasons) console.log(`  ${reason}: ${count}`);
}

/** Reads the source to its end, or until stopped. */
const read = async (keep: (post: Post) => void | Promise<void>) =>
  replay({
    source: await openSource(),
    firstDay: firstDay(),
    isStated: options.date !== undefined,
    speed: options.speed,
    keep,
    stop,
  });

async function handOver(toTcp: string): Promise<void> {
  const sink = await openTcpSink(...split(toTcp), options.key);
  await read((post) => sink.keep(post));
  const refusal = await sink.close();
  if (refusal) throw new Error(refusal);
}

async function sendByPosts(url: string): Promise<void> {
  const { key } = options;
  const hash = createHash('sha256').update(key).digest('hex').slice(0, 12);
  const folder = options.spool ?? join('var/spool', hash);
  if (!(await claimFolder(folder)))
    throw new Error(`Another sender uses the spool ${folder}. One rover key, one sender; or say --spool.`);
  const spool = new Spool(folder);
  if (spool.length > 0) console.log(`${spool.length} posts from before are sent first`);
  let finished = false;
  const reading = read((post) => spool.keep(post)).finally(() => {
    finished = true;
  });
  const sending = forward({
    url,
    key,
    spool,
    isFinished: () => finished,
    onWaiting: (why, waitMs) =>
      console.error(`${why}; ${spool.length} posts kept, trying again in ${waitMs / 1000} s`),
    stop: stopSending.signal,
  });
  // A source that fails still leaves what was read before to be sent; a refused key ends both.
  const [sent, problem] = await Promise.all([
    sending,
    reading.then(
      () => null,
      (error: Error) => error,
    ),
  ]);
  report(sent);
  if (spool.length > 0) console.log(`${spool.length} posts wait in ${folder} and are sent at the next start`);
  if (problem) throw problem;
}

try {
  await (options['to-tcp'] ? handOver(options['to-tcp']) : sendByPosts(options.url!));
  process.exit(0);
} catch (error) {
  console.error((error as Error).message);
  process.exit(1);
}
