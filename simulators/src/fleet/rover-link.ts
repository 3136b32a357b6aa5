import { connect, type Socket } from 'node:net';

/** How a simulated rover hands its sentences over. */
export interface RoverLink {
  send(sentences: string): Promise<void>;
  close(): void;
}

export class HttpLink implements RoverLink {
  constructor(
    private readonly url: string,
    private readonly key: string,
  ) {}

  async send(sentences: string): Promise<void> {
    const response = await fetch(new URL('/api/ingest/nmea', this.url), {
      method: 'POST',
      headers: { authorization: `Bearer ${this.key}`, 'content-type': 'text/plain' },
      body: sentences,
    });
    const text = await response.text();
    if (!response.ok) throw new Error(`the server answers ${response.status}: ${text.slice(0, 200)}`);
  }

  close(): void {
    // Nothing is held open.
  }
}

export class TcpLink implements RoverLink {
  private socket: Socket | null = null;
  /** What the server said: over TCP it speaks only to refuse. */
  private refusal = '';

  constructor(
    private readonly host: string,
    private readonly port: number,
    private readonly key: string,
  ) {}

  async send(sentences: string): Promise<void> {
    if (this.refusal) throw new Error(`the server says: ${this.refusal}`);
    const socket = this.socket ?? (await this.open());
    await new Promise<void>((resolve, reject) => {
      socket.write(sentences, (error) => (error ? reject(error) : resolve()));
    });
  }

  close(): void {
    this.socket?.end();
  }

  private open(): Promise<Socket> {
    return new Promise((resolve, reject) => {
      const socket = connect(this.port, this.host, () => {
        this.socket = socket;
        socket.write(`KEY ${this.key}\r\n`);
        resolve(socket);
      });
      socket.on('error', reject);
      socket.on('close', () => {
        this.socket = null;
      });
      socket.on('data', (chunk) => {
        this.refusal = chunk.toString('latin1').trim();
      });
    });
  }
}
