import {
  lanesEvent,
  lostFixEvent,
  noticeEvent,
  resetEvent,
  type LanesEvent,
  type LostFixEvent,
} from '@hubtack/contracts/stream/events.js';
import type { QueryClient } from '@tanstack/react-query';
import { refreshSignIn } from '../lib/api';
import { crewDayKey } from '../lib/crew-day';
import { landLostFixes } from '../lib/lost-fixes';
import { landNotice, noticesQuery } from '../lib/notices';
import { meQuery } from '../lib/session';
import { Batcher } from './batcher';
import { boardQuery } from './board-query';
import { applyEvents } from './board-state';
import type { StreamStatus } from './stream-status';

const BATCH_MS = 250;
const FIRST_WAIT_MS = 1000;
const LONGEST_WAIT_MS = 20_000;

/**
 * Follows the board stream and is the one writer of the board's cache entry. The browser's own EventSource comes back by
 * itself after a break; when it gives up (a refused answer), the sign-in is renewed and a new one opened from the
 * last cursor, later each time and not at the same moment as everybody else's.
 */
export class BoardStream {
  status: StreamStatus = { lastHeardAt: null, cutSince: null };
  private source: EventSource | null = null;
  private cursor: string | null = null;
  private waitMs = FIRST_WAIT_MS;
  private timer: ReturnType<typeof setTimeout> | null = null;
  private readonly listeners = new Set<() => void>();
  private readonly batcher = new Batcher<LanesEvent | LostFixEvent>(BATCH_MS, (events) => this.land(events));

  constructor(private readonly client: QueryClient) {}

  open(cursor: string): void {
    this.close();
    this.cursor = cursor;
    this.connect();
  }

  close(): void {
    this.source?.close();
    this.source = null;
    if (this.timer !== null) clearTimeout(this.timer);
    this.timer = null;
    this.batcher.clear();
  }

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };

  readonly getStatus = (): StreamStatus => this.status;

  private connect(): void {
    const source = new EventSource(`/api/board/stream?cursor=${encodeURIComponent(this.cursor ?? '')}`);
    this.source = source;
    source.addEventListener('lanes', (message: MessageEvent<string>) => {
      this.heard(message);
      const event = lanesEvent.safeParse(JSON.parse(message.data));
      if (event.success) this.batcher.push(event.data);
      // A server newer than this page: its snapshot is read anew, and says so if that cannot be read either.
      else void this.start();
    });
    source.addEventListener('lost-fix', (message: MessageEvent<string>) => {
      this.heard(message);
      const event = lostFixEvent.safeParse(JSON.parse(message.data));
      if (event.success) this.batcher.push(event.data);
      else void this.start();
    });
    source.addEventListener('notice', (message: MessageEvent<string>) => {
      this.heard(message);
      const event = noticeEvent.safeParse(JSON.parse(message.data));
      if (event.success) landNotice(this.client, event.data);
    });
    // Notices are no part of what is resumed: those told meanwhile are fetched.
    source.addEventListener('open', () => {
      void this.client.invalidateQueries({ queryKey: noticesQuery.queryKey });
    });
    source.addEventListener('beat', () => this.heard(null));
    source.addEventListener('reset', (message: MessageEvent<string>) => {
      this.heard(message);
      if (resetEvent.safeParse(JSON.parse(message.data)).success) void this.start();
    });
    source.addEventListener('error', () => {
      this.cut();
      if (source.readyState === EventSource.CLOSED) this.comeBackLater();
    });
  }

  /** Reads the snapshot anew and follows from its cursor. */
  private async start(): Promise<void> {
    this.close();
    try {
      const board = await this.client.fetchQuery({ ...boardQuery, staleTime: 0 });
      this.open(board.cursor);
    } catch {
      this.comeBackLater();
    }
  }

  private comeBackLater(): void {
    this.source?.close();
    this.source = null;
    const jitter = 0.7 + Math.random() * 0.6;
    this.timer = setTimeout(() => void this.comeBack(), this.waitMs * jitter);
    this.waitMs = Math.min(LONGEST_WAIT_MS, this.waitMs * 2);
  }

  private async comeBack(): Promise<void> {
    this.timer = null;
    const mayGoOn = await refreshSignIn().catch(() => null);
    if (mayGoOn === null) return this.comeBackLater();
    if (!mayGoOn) {
      this.client.setQueryData(meQuery.queryKey, null);
      return;
    }
    this.connect();
  }

  private land(events: (LanesEvent | LostFixEvent)[]): void {
    const lostFixes = events.flatMap((event) => ('lostFixes' in event ? event.lostFixes : []));
    if (lostFixes.length > 0) {
      landLostFixes(this.client, lostFixes);
      void this.client.invalidateQueries({ queryKey: crewDayKey });
    }
    this.client.setQueryData(boardQuery.queryKey, (board) => {
      if (!board) return board;
      return { ...applyEvents(board, events, Date.now()), cursor: this.cursor ?? board.cursor };
    });
  }

  private heard(message: MessageEvent | null): void {
    if (message?.lastEventId) this.cursor = message.lastEventId;
    this.waitMs = FIRST_WAIT_MS;
    this.status = { lastHeardAt: Date.now(), cutSince: null };
    this.tell();
  }

  private cut(): void {
    this.status = { ...this.status, cutSince: this.status.cutSince ?? Date.now() };
    this.tell();
  }

  private tell(): void {
    for (const listener of this.listeners) listener();
  }
}
