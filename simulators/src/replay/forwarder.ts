import { setTimeout as delay } from 'node:timers/promises';
import { ingestAnswer, type IngestAnswer } from '@hubtack/contracts/ingest/ingest.js';
import type { Post } from './post-builder.js';
import type { Spool } from './spool.js';

const FIRST_WAIT_MS = 500;
const LONGEST_WAIT_MS = 30_000;
/** A server that says nothing for so long is taken for away. */
const ANSWER_WITHIN_MS = 30_000;
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
  /** Ends at once; what is not answered for stays in the spool. */
  stop?: AbortSignal;
  /** Waits so many ms; for tests. */
  rest?: (ms: number) => Promise<unknown>;
}

/** What became of a post: the server's answer, that nothing in it could be read, or why to wait. */
type Outcome = IngestAnswer | 'unreadable' | { why: string; waitMs?: number };

/**
 * Sends what is in the spool, in order, and goes on trying while the server is away. A post leaves the spool only for an
 * answer that is the server's own: a proxy's or a sign-on page's "200 OK" is not one.
 */
export async function forward(options: ForwarderOptions): Promise<Sent> {
  const { spool, isFinished, stop } = options;
  const sent: Sent = { posts: 0, accepted: 0, duplicates: 0, ignored: 0, rejected: 0, reasons: new Map() };
  const timer = stop ? { signal: stop } : {};
  const rest = options.rest ?? ((ms: number) => delay(ms, undefined, timer).catch(() => undefined));
  let waitMs = FIRST_WAIT_MS;
  for (;;) {
    if (stop?.aborted) return sent;
    const oldest = spool.oldest();
    if (oldest === null) {
      if (isFinished()) return sent;
      await rest(IDLE_MS);
      continue;
    }
    const outcome = await post(options, oldest.post);
    if (typeof outcome === 'object' && 'why' in outcome) {
      if (stop?.aborted) return sent;
      options.onWaiting?.(outcome.why, outcome.waitMs ?? waitMs);
      await rest(outcome.waitMs ?? waitMs);
      waitMs = Math.min(LONGEST_WAIT_MS, waitMs * 2);
      continue;
    }
    waitMs = FIRST_WAIT_MS;
    count(sent, outcome);
    spool.done(oldest.number);
  }
}

async function post(options: ForwarderOptions, { date, body }: Post): Promise<Outcome> {
  const address = new URL('/api/ingest/nmea', options.url);
  if (date !== null) address.searchParams.set('date', date);
  const limit = AbortSignal.timeout(ANSWER_WITHIN_MS);
  let response: Response;
  let text: string;
  try {
    response = await fetch(address, {
      method: 'POST',
      headers: { authorization: `Bearer ${options.key}`, 'content-type': 'text/plain' },
      body: new Uint8Array(body),
      redirect: 'manual',
      signal: options.stop ? AbortSignal.any([limit, options.stop]) : limit,
    });
    text = await response.text();
  } catch (error) {
    return { why: `the server cannot be reached (${String((error as Error).cause ?? error)})` };
  }
  if (response.status === 401)
    throw new KeyRefused('The server does not know this rover key. What is not sent yet stays in the spool.');
  if (response.status === 200) {
    const answer = ingestAnswer.safeParse(jsonOf(text));
    return answer.success ? answer.data : { why: `what answers at ${address.origin} is not Hubtack` };
  }
  // No sentence in it: sending it again would not change that.
  if (response.status === 400 && codeOf(text) === 'unreadable') return 'unreadable';
  const retryAfter = Number(response.headers.get('retry-after'));
  const why = `the server answers ${response.status}`;
  return retryAfter > 0 ? { why, waitMs: retryAfter * 1000 } : { why };
}

function jsonOf(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}

function codeOf(text: string): unknown {
  const problem = jsonOf(text);
  return typeof problem === 'object' && problem !== null && 'code' in problem ? problem.code : null;
}

function count(sent: Sent, answer: IngestAnswer | 'unreadable'): void {
  const { reasons } = sent;
  const add = (reason: string, by: number) => reasons.set(reason, (reasons.get(reason) ?? 0) + by);
  sent.posts++;
  if (answer === 'unreadable') {
    sent.rejected++;
    add('unreadable', 1);
    return;
  }
  sent.accepted += answer.accepted;
  sent.duplicates += answer.duplicates;
  sent.ignored += answer.ignored;
  sent.rejected += answer.rejected;
  for (const { code } of answer.reasons) add(code, 1);
  // An answer names its first twenty reasons only.
  const unnamed = answer.rejected - answer.reasons.length;
  if (unnamed > 0) add('not named', unnamed);
}
