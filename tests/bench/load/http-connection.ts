import { connect, type Socket } from 'node:net';

/** One keep-alive connection that posts and waits for each answer: written by hand because the load must cost less than what it measures. */
export class HttpConnection {
  private answer = '';
  private done: ((status: number) => void) | null = null;
  private readonly head: string;

  private constructor(
    private readonly socket: Socket,
    key: string,
  ) {
    this.head = `POST /api/ingest/nmea HTTP/1.1\r\nHost: bench\r\nAuthorization: Bearer ${key}\r\nContent-Type: text/plain\r\nContent-Length: `;
    socket.setEncoding('latin1');
    socket.on('data', (chunk: string) => this.read(chunk));
  }

  static open(port: number, key: string): Promise<HttpConnection> {
    return new Promise((resolve, reject) => {
      const socket = connect({ port, host: '127.0.0.1', noDelay: true }, () =>
        resolve(new HttpConnection(socket, key)),
      );
      socket.once('error', reject);
    });
  }

  /** Posts a body; answers the status. */
  post(body: Buffer): Promise<number> {
    return new Promise((resolve) => {
      this.done = resolve;
      this.socket.write(Buffer.concat([Buffer.from(`${this.head}${body.length}\r\n\r\n`, 'latin1'), body]));
    });
  }

  close(): void {
    this.socket.destroy();
  }

  private read(chunk: string): void {
    this.answer += chunk;
    const end = this.answer.indexOf('\r\n\r\n');
    if (end < 0) return;
    const length = Number(/content-length: (\d+)/i.exec(this.answer)?.[1] ?? 0);
    if (this.answer.length < end + 4 + length) return;
    const status = Number(this.answer.slice(9, 12));
    this.answer = '';
    this.done?.(status);
  }
}
