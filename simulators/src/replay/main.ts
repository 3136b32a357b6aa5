import { createHash } from 'node:crypto';
import { join } from 'node:path';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import { z } from 'zod';
import { readOptions } from '../cli/options.js';
import { KeyRefused, forward, type Sent } from './forwarder.js';
import { LineSplitter } from './line-splitter.js';
import { firstDayOf } from './line-time.js';
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
      speed: z.union([z.literal('max').transform(() => Infinity), z.coerce.number().positive()]).default(1),
      url: z.url().optional(),
      'to-tcp': hostAndPort.optional(),
      key: z.string('say the rover key').min(1),
      spool: z.string().optional(),
      positionals: z.array(z.string()),
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

async function openSource(): Promise<Source> {
  if (options.file) return fileSource(options.file);
  if (options.tcp) return tcpSource(...split(options.tcp));
  if (options.serial) return serialSource(options.serial, options.baud);
  return stdinSource();
}

function firstDay(): number | null {
  if (options.date) return Date.parse(options.date) / DAY_MS;
  return options.file ? firstDayOf(new LineSplitter().push(headOf(options.file))) : null;
}

function report(sent: Sent): void {
  const { posts, accepted, duplicates, ignored, rejected } = sent;
  console.log(
    `${posts} posts: ${accepted} accepted, ${duplicates} duplicates, ${ignored} ignored, ${rejected} rejected`,
  );
  for (const [reason, count] of sent.reasons) console.log(`  ${reason}: ${count}`);
}

const { speed, key, url } = options;
const isStated = options.date !== undefined;
try {
  const source = await openSource();
  if (options['to-tcp']) {
    const sink = await openTcpSink(...split(options['to-tcp']), key);
    await replay({ source, firstDay: firstDay(), isStated, speed, keep: (post) => sink.keep(post) });
    const refusal = await sink.close();
    if (refusal) throw new KeyRefused(`The server said: ${refusal}`);
  } else {
    const hash = createHash('sha256').update(key).digest('hex').slice(0, 12);
    const spool = new Spool(options.spool ?? join('var/spool', hash));
    if (spool.length > 0) console.log(`${spool.length} posts from before are sent first`);
    let finished = false;
    const reading = replay({
      source,
      firstDay: firstDay(),
      isStated,
      speed,
      keep: (post) => spool.keep(post),
    }).finally(() => {
      finished = true;
    });
    const [sent] = await Promise.all([
      forward({
        url: url!,
        key,
        spool,
        isFinished: () => finished,
        onWaiting: (why, waitMs) =>
          console.error(`${why}; ${spool.length} posts kept, trying again in ${waitMs / 1000} s`),
      }),
      reading,
    ]);
    report(sent);
  }
} catch (error) {
  console.error((error as Error).message);
  process.exit(1);
}
