import { connect, type Socket } from 'node:net';

/** A board that only drains its stream, or stops reading; `onText` sees what comes when somebody looks. */
export class StreamDrain {
  bytes = 0;

  private constructor(private readonly socket: Socket) {}

  static open(
    port: number,
    cookie: string,
    path: string,
    onText?: (text: string) => void,
  ): Promise<StreamDrain> {
    return new Promise((resolve, reject) => {
      const socket = connect(port, '127.0.0.1', () => {
        socket.write(
          `GET ${path} HTTP/1.1\r\nHost: bench\r\nCookie: ${cookie}\r\nAccept: text/event-stream\r\n\r\n`,
        );
      });
      const drain = new StreamDrain(socket);
      socket.once('data', () => resolve(drain));
      socket.on('data', (chunk) => {
        drain.bytes += chunk.length;
        onText?.(chunk.toString('latin1'));
      });
      socket.once('error', reject);
    });
  }

  /** Stops reading, as a tab that hangs does. */
  stall(): void {
    this.socket.pause();
  }

  get isClosed(): boolean {
    return this.socket.destroyed;
  }

  close(): void {
    this.socket.destroy();
  }
}
