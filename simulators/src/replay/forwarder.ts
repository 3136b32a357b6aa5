import { setTimeout as delay } from 'node:timers/promises';
import { ingestAnswer } from '@hubtack/contracts/ingest/ingest.js';
import type { Post } from './post-builder.js';
import type { Spool } from './spool.js';

const FIRST_WAIT_MS = 500;
const LONGEST_WAIT_MS = 30_000;
/** How often an empty spool is looked at. */
const IDLE_MS = 50;

/** The server will not take this key: nothing that waiting would mend. */
export class KeyRefused extends Error {}

export interface Sent {
  posts: number;
  accepted: number;
  duplicates: number;
  ignored: number;
  rejected: number;
  reasons: Map<string, number>;
}

export interface ForwarderOptions {
  url: string;
  key: string;
  spool: Spool;
  /** No more posts will be kept: end when the spool is empty. */
  isFinished: () => boolean;
  onWaiting?: (why: string, waitMs: number) => void;
}

const addTo = (counts: Map<string, number>, reason: string, by = 1) =>
  counts.set(reason, (counts.get(reason) ?? 0) + by);

/** Sends what is in the spool, in order, and goes on trying while the server is away. */
export async function forward(options: ForwarderOptions): Promise<Sent> {
  const { spool, isFinished } = options;
  const sent: Sent = { posts: 0, accepted: 0, duplicates: 0, ignored: 0, rejected: 0, reasons: new Map() };
  let waitMs = FIRST_WAIT_MS;
  for (;;) {
    const oldest = spool.oldest();
    if (oldest === null) {
      if (isFinished()) return sent;
      await delay(IDLE_MS);
      continue;
    }
    const result = await post(options, oldest.post);
    if (typeof result === 'object') {
      options.onWaiting?.(result.why, result.waitMs ?? waitMs);
      await delay(result.waitMs ?? waitMs);
      waitMs = Math.min(LONGEST_WAIT_MS, waitMs * 2);
      continue;
    }
    waitMs = FIRST_WAIT_MS;
    count(sent, result);
    spool.done(oldest.number);
  }
}

/** The body of an answer, or why to wait. */
async function post(
  options: ForwarderOptions,
  { date, body }: Post,
): Promise<string | { why: string; waitMs?: number }> {
  const address = new URL('/api/ingest/nmea', options.url);
  if (date !== null) address.searchParams.set('date', date);
  let response: Response;
  let text: string;
  try {
    response = await fetch(address, {
      method: 'POST',
      headers: { authorization: `Bearer ${options.key}`, 'content-type': 'text/plain' },
      body: new Uint8Array(body),
    });
    text = await response.text();
  } catch (error) {
    return { why: `the server cannot be reached (${String((error as Error).cause ?? error)})` };
  }
  if (response.status === 401)
    throw new KeyRefused('The server does not know this rover key. What is not sent yet stays in the spool.');
  if (response.ok || response.status === 400) return text;
  const retryAfter = Number(response.headers.get('retry-after'));
  const why = `the server answers ${response.status}`;
  return retryAfter > 0 ? { why, waitMs: retryAfter * 1000 } : { why };
}

function count(sent: Sent, text: string): void {
  sent.posts++;
  const answer = ingestAnswer.safeParse(JSON.parse(text));
  if (!answer.success) {
    // Nothing in it could be read; sending it again would not change that.
    sent.rejected++;
    addTo(sent.reasons, 'unreadable');
    return;
  }
  sent.accepted += answer.data.accepted;
  sent.duplicates += answer.data.duplicates;
  sent.ignored += answer.data.ignored;
  sent.rejected += answer.data.rejected;
  for (const { code } of answer.data.reasons) addTo(sent.reasons, code);
}
