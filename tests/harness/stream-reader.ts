import { createParser, type EventSourceMessage } from 'eventsource-parser';
import type { Client } from './client.js';

export interface StreamMessage {
  event: string;
  id: string | undefined;
  data: never;
}

/** A board stream read by a published parser of the standard's format, not by our own code. */
export class StreamReading {
  readonly messages: StreamMessage[] = [];
  retryMs: number | undefined;
  ended = false;
  private readonly waiting = new Set<() => void>();
  private readonly abort = new AbortController();

  static async open(
    client: Client,
    options: { cursor?: string; lastEventId?: string } = {},
  ): Promise<StreamReading> {
    const reading = new StreamReading();
    const query = options.cursor === undefined ? '' : `?cursor=${options.cursor}`;
    const response = await fetch(new URL(`/api/board/stream${query}`, client.url), {
      headers: {
        cookie: client.cookieHeader,
        ...(options.lastEventId === undefined ? {} : { 'last-event-id': options.lastEventId }),
      },
      signal: reading.abort.signal,
    });
    if (response.status !== 200) throw new Error(`the stream answers ${response.status}`);
    if (response.headers.get('content-type') !== 'text/event-stream') throw new Error('not an event stream');
    void reading.read(response);
    return reading;
  }

  close(): void {
    this.abort.abort();
  }

  /** The first message, now or later, that fits. */
  async waitFor(
    event: string,
    fits: (message: StreamMessage) => boolean = () => true,
  ): Promise<StreamMessage> {
    for (;;) {
      const found = this.messages.find((message) => message.event === event && fits(message));
      if (found) return found;
      if (this.ended) throw new Error(`the stream ended without ${event}`);
      await this.next();
    }
  }

  async waitForEnd(): Promise<void> {
    while (!this.ended) await this.next();
  }

  private next(): Promise<void> {
    return new Promise((resolve) => {
      this.waiting.add(resolve);
    });
  }

  private async read(response: Response): Promise<void> {
    const parser = createParser({
      onEvent: (event: EventSourceMessage) => {
        this.messages.push({
          event: event.event ?? 'message',
          id: event.id,
          data: JSON.parse(event.data) as never,
        });
        this.wake();
      },
      onRetry: (ms) => {
        this.retryMs = ms;
      },
    });
    const decoder = new TextDecoder();
    try {
      for await (const chunk of response.body!) parser.feed(decoder.decode(chunk, { stream: true }));
    } catch {
      // Closed by the test, or cut by the server: either way it has ended.
    }
    this.ended = true;
    this.wake();
  }

  private wake(): void {
    const waiting = [...this.waiting];
    this.waiting.clear();
    for (const resolve of waiting) resolve();
  }
}
