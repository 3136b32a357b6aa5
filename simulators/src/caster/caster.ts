import { createServer, type AddressInfo, type Server, type Socket } from 'node:net';
import { createServer as createTlsServer } from 'node:tls';
import { GGA_LINE, readRequest, type CasterRequest } from './request.js';
import type { MountPointOptions, StreamFaults } from './mount-point.js';
import { CasterStream } from './stream.js';
import { sourceTable } from './source-table.js';

/** Faults of the caster itself. */
export interface CasterFaults {
  /** Takes connections and says nothing. */
  mute?: boolean;
  /** The table has no ENDSOURCETABLE; the connection is closed after it, or kept open. */
  tableWithoutEnd?: 'closed' | 'kept';
  /** The table goes on without end. */
  endlessTable?: boolean;
  /** So many bytes without a line end before anything else. */
  bannerBytes?: number;
  /** Sends clients on to this address. */
  redirectTo?: string;
  /** Says that the body is compressed. */
  gzip?: boolean;
  /** A web page instead of a table. */
  webPage?: boolean;
  /** The table as this text. */
  tableText?: string;
  /** Stream answers of version 1 without a blank line after ICY. */
  noBlankLine?: boolean;
  /** Answers version 2 requests as a version 1 caster does. */
  onlyVersion1?: boolean;
  /** The table is shown with a login only. */
  tableNeedsLogin?: boolean;
}

interface CasterOptions {
  mountPoints: MountPointOptions[];
  port?: number;
  host?: string;
  tls?: { key: string; cert: string };
  seed?: number;
  /** Frames of one second are sent in so many ms; 1000 when not said. Tests go faster. */
  secondMs?: number;
  faults?: CasterFaults;
}

export interface CasterLog extends Omit<CasterRequest, 'authorization'> {
  /** GGA sentences that came with the request and after it. */
  positions: string[];
  outcome: 'table' | 'stream' | 'refused' | 'none';
}

const MOST_CONNECTIONS = 100;

/** A local NTRIP caster, versions 1 and 2, with faults on demand. What was asked of it can be read back. */
export class Caster {
  readonly requests: CasterLog[] = [];
  faults: CasterFaults;
  private readonly sockets = new Set<Socket>();
  private readonly streams = new Set<CasterStream>();
  private readonly server: Server;
  private streamsBegun = 0;

  constructor(private readonly options: CasterOptions) {
    this.faults = options.faults ?? {};
    const serve = (socket: Socket) => this.serve(socket);
    this.server = options.tls ? createTlsServer(options.tls, serve) : createServer(serve);
    this.server.maxConnections = MOST_CONNECTIONS;
    // A client that speaks no TLS is a fault of the client.
    this.server.on('tlsClientError', () => undefined);
  }

  listen(): Promise<this> {
    return new Promise((resolve, reject) => {
      this.server.once('error', reject);
      this.server.listen(this.options.port ?? 0, this.options.host ?? '127.0.0.1', () => resolve(this));
    });
  }

  get port(): number {
    return (this.server.address() as AddressInfo).port;
  }

  /** Changes what is wrong with a mount point from the next frame on; an empty one makes it well. */
  setFaults(name: string, faults: StreamFaults): void {
    const mountPoint = this.find(name);
    if (!mountPoint) throw new Error(`there is no mount point ${name}`);
    mountPoint.faults = faults;
  }

  async close(): Promise<void> {
    for (const stream of this.streams) stream.stop();
    for (const socket of this.sockets) socket.destroy();
    await new Promise((resolve) => {
      this.server.close(resolve);
    });
  }

  private find(name: string): MountPointOptions | undefined {
    return this.options.mountPoints.find((one) => one.name === name);
  }

  private serve(socket: Socket): void {
    this.sockets.add(socket);
    socket.on('error', () => socket.destroy());
    socket.once('close', () => this.sockets.delete(socket));
    const { faults } = this;
    if (faults.mute) return;
    if (faults.bannerBytes !== undefined) {
      socket.write(Buffer.alloc(faults.bannerBytes, 'B'));
      return;
    }
    let held = '';
    let log: CasterLog | null = null;
    let stream: CasterStream | null = null;
    socket.on('data', (chunk: Buffer) => {
      held += chunk.toString('latin1');
      if (!log) {
        const end = held.indexOf('\r\n\r\n');
        if (end < 0) return;
        const request = readRequest(held.slice(0, end));
        held = held.slice(end + 4);
        const { authorization: _secret, ...rest } = request;
        log = { ...rest, positions: request.gga === null ? [] : [request.gga], outcome: 'none' };
        this.requests.push(log);
        stream = this.answer(socket, request, log);
      }
      for (const [line] of held.matchAll(GGA_LINE)) log.positions.push(line);
      held = held.slice(held.lastIndexOf('\n') + 1);
      const position = log.positions.at(-1);
      if (position !== undefined) stream?.locate(position);
    });
  }

  private answer(socket: Socket, request: CasterRequest, log: CasterLog): CasterStream | null {
    const { faults } = this;
    const is2 = request.version === 2 && !faults.onlyVersion1;
    const reply = (status: string, headers: string[], body = '') =>
      socket.end([`HTTP/1.1 ${status}`, ...headers, 'Connection: close', '', body].join('\r\n'));
    const mountPoint = request.mountPoint === null ? undefined : this.find(request.mountPoint);
    if (faults.redirectTo !== undefined) {
      reply('302 Found', [`Location: ${faults.redirectTo}`]);
      return null;
    }
    if (!mountPoint || mountPoint.faults?.withdrawn) {
      log.outcome = 'table';
      this.sendTable(socket, request, is2, reply);
      return null;
    }
    if (mountPoint.faults?.mute) return null;
    const { login } = mountPoint;
    const isWelcome = !login || request.authorization === `Basic ${btoa(`${login.user}:${login.password}`)}`;
    const status = mountPoint.faults?.status ?? (isWelcome ? 200 : 401);
    if (status !== 200) {
      log.outcome = 'refused';
      reply(
        status === 401 ? '401 Unauthorized' : `${status} Refused`,
        status === 401 ? [`WWW-Authenticate: Basic realm="${mountPoint.name}"`] : [],
      );
      return null;
    }
    log.outcome = 'stream';
    socket.write(streamHead(is2, faults));
    const seed = (this.options.seed ?? 1) + this.streamsBegun++;
    const stream = new CasterStream(socket, mountPoint, {
      isChunked: is2,
      seed,
      secondMs: this.options.secondMs ?? 1000,
    });
    this.streams.add(stream);
    socket.once('close', () => {
      stream.stop();
      this.streams.delete(stream);
    });
    stream.start();
    return stream;
  }

  private sendTable(
    socket: Socket,
    request: CasterRequest,
    is2: boolean,
    reply: (status: string, headers: string[], body?: string) => void,
  ): void {
    const { faults } = this;
    if (faults.webPage) return reply('200 OK', ['Content-Type: text/html'], '<html>It works</html>');
    if (faults.tableNeedsLogin && request.authorization === null)
      return reply('401 Unauthorized', ['WWW-Authenticate: Basic realm="table"']);
    const isWhole = faults.tableWithoutEnd === undefined && !faults.endlessTable;
    const text = faults.tableText ?? sourceTable(this.options.mountPoints, isWhole);
    const encoding = faults.gzip ? ['Content-Encoding: gzip'] : [];
    const head = is2
      ? ['HTTP/1.1 200 OK', 'Ntrip-Version: Ntrip/2.0', 'Content-Type: gnss/sourcetable', ...encoding]
      : ['SOURCETABLE 200 OK', 'Server: NTRIP simulated caster', 'Content-Type: text/plain'];
    if (isWhole) head.push(`Content-Length: ${Buffer.byteLength(text)}`);
    socket.write(`${head.join('\r\n')}\r\n\r\n${text}`);
    if (faults.endlessTable) this.goOn(socket);
    else if (faults.tableWithoutEnd !== 'kept') socket.end();
  }

  private goOn(socket: Socket): void {
    const row = 'STR;ROW;Row;RTCM 3.3;1005(1);2;GPS;NET;AUS;-41.44;147.14;0;0;s;none;N;N;1;\r\n'.repeat(500);
    const more = () => {
      while (!socket.destroyed && socket.write(row));
    };
    socket.on('drain', more);
    more();
  }
}

function streamHead(is2: boolean, { noBlankLine, gzip }: CasterFaults): string {
  if (!is2) return noBlankLine ? 'ICY 200 OK\r\n' : 'ICY 200 OK\r\n\r\n';
  const encoding = gzip ? 'Content-Encoding: gzip\r\n' : '';
  return `HTTP/1.1 200 OK\r\nNtrip-Version: Ntrip/2.0\r\nContent-Type: gnss/data\r\n${encoding}Transfer-Encoding: chunked\r\nConnection: close\r\n\r\n`;
}

export const startCaster = (options: CasterOptions): Promise<Caster> => new Caster(options).listen();
