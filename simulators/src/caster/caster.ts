import { createServer, type AddressInfo, type Server, type Socket } from 'node:net';
import { createServer as createTlsServer } from 'node:tls';
import { httpAnswer, streamHead, tableAnswer } from './answers.js';
import type { CasterFaults } from './caster-faults.js';
import { listenTo } from './conversation.js';
import type { MountPointOptions, StreamFaults } from './mount-point.js';
import type { CasterRequest } from './request.js';
import { sourceTable } from './source-table.js';
import { CasterStream } from './stream.js';

interface CasterOptions {
  mountPoints: MountPointOptions[];
  port?: number;
  host?: string;
  /** PEM. */
  tls?: { key: string; cert: string };
  seed?: number;
  /** Frames of one second are sent in so many ms; 1000 when not said. Tests go faster. */
  secondMs?: number;
  faults?: CasterFaults;
}

/** What was asked. Passwords are not kept. */
export interface CasterLog extends Omit<CasterRequest, 'login' | 'gga'> {
  user: string | null;
  /** GGA sentences that came with the request and after it; the newest ones. */
  positions: string[];
  outcome: 'table' | 'stream' | 'refused' | 'none';
}

const MOST_CONNECTIONS = 100;
const MOST_REQUESTS_KEPT = 10_000;
const MOST_POSITIONS_KEPT = 1000;

/** A local NTRIP caster, versions 1 and 2, with faults on demand. What was asked of it can be read back. */
export class Caster {
  readonly requests: CasterLog[] = [];
  faults: CasterFaults;
  private readonly sockets = new Set<Socket>();
  private readonly server: Server;
  private streamsBegun = 0;

  constructor(private readonly options: CasterOptions) {
    this.faults = options.faults ?? {};
    const serve = (socket: Socket) => this.serve(socket);
    this.server = options.tls ? createTlsServer(options.tls, serve) : createServer(serve);
    this.server.maxConnections = MOST_CONNECTIONS;
    // Before TLS is agreed on as well, or a client that never does would hold up the end.
    this.server.on('connection', (socket: Socket) => {
      this.sockets.add(socket);
      socket.once('close', () => this.sockets.delete(socket));
    });
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
    const closed = new Promise((resolve) => {
      this.server.close(resolve);
    });
    for (const socket of this.sockets) socket.destroy();
    await closed;
  }

  private find(name: string): MountPointOptions | undefined {
    return this.options.mountPoints.find((one) => one.name === name);
  }

  private serve(socket: Socket): void {
    socket.on('error', () => socket.destroy());
    const { faults } = this;
    if (faults.mute) return;
    if (faults.bannerBytes !== undefined) {
      socket.write(Buffer.alloc(faults.bannerBytes, 'B'));
      return;
    }
    let log: CasterLog | null = null;
    let stream: CasterStream | null = null;
    listenTo(socket, {
      request: (request) => {
        if (!request) return void socket.end(httpAnswer('400 Bad Request', [], faults));
        log = this.note(request);
        stream = this.answer(socket, request, log);
      },
      position: (gga) => {
        log?.positions.push(gga);
        log?.positions.splice(0, log.positions.length - MOST_POSITIONS_KEPT);
        stream?.locate(gga);
      },
    });
  }

  private note({ login, gga: _gga, ...request }: CasterRequest): CasterLog {
    const log: CasterLog = { ...request, user: login?.user ?? null, positions: [], outcome: 'none' };
    this.requests.push(log);
    if (this.requests.length > MOST_REQUESTS_KEPT) this.requests.shift();
    return log;
  }

  private answer(socket: Socket, request: CasterRequest, log: CasterLog): CasterStream | null {
    const { faults } = this;
    const is2 = request.version === 2 && !faults.onlyVersion1;
    const reply = (status: string, headers: string[] = [], body = '') => {
      socket.end(httpAnswer(status, headers, faults, body));
      return null;
    };
    const refuse = (status: number, realm: string) => {
      log.outcome = 'refused';
      return status === 401
        ? reply('401 Unauthorized', [`WWW-Authenticate: Basic realm="${realm}"`])
        : reply(`${status} Refused`);
    };
    if (request.method !== 'GET') return reply('405 Method Not Allowed', ['Allow: GET']);
    if (faults.redirectTo !== undefined) return reply('302 Found', [`Location: ${faults.redirectTo}`]);
    const mountPoint = request.mountPoint === null ? undefined : this.find(request.mountPoint);
    // RTCM 10410.0, 5.1: for a mount point that is not there the answer is the table.
    if (!mountPoint || mountPoint.faults?.withdrawn) {
      if (faults.webPage) return reply('200 OK', ['Content-Type: text/html'], '<html>It works</html>');
      if (faults.tableNeedsLogin && !request.login) return refuse(401, 'table');
      log.outcome = 'table';
      this.sendTable(socket, is2);
      return null;
    }
    if (mountPoint.faults?.mute) return null;
    const status = mountPoint.faults?.status ?? (isWelcome(mountPoint, request) ? 200 : 401);
    if (status !== 200) return refuse(status, mountPoint.name);
    log.outcome = 'stream';
    socket.write(streamHead(is2, faults));
    return new CasterStream(socket, mountPoint, {
      isChunked: is2,
      isCompressed: is2 && faults.gzip === true,
      seed: (this.options.seed ?? 1) + this.streamsBegun++,
      secondMs: this.options.secondMs ?? 1000,
      startAt: Date.now(),
    });
  }

  private sendTable(socket: Socket, is2: boolean): void {
    const { faults } = this;
    const text = faults.tableText ?? sourceTable(this.options.mountPoints, faults);
    socket.write(tableAnswer(text, is2, faults));
    if (faults.endlessTable) writeWithoutEnd(socket);
    else if (faults.tableWithoutEnd !== 'kept') socket.end();
  }
}

const isWelcome = ({ login }: MountPointOptions, request: CasterRequest): boolean =>
  !login || (request.login?.user === login.user && request.login.password === login.password);

/** As fast as the client takes it, and no faster. */
function writeWithoutEnd(socket: Socket): void {
  const row = 'STR;ROW;Row;RTCM 3.3;1005(1);2;GPS;NET;AUS;-41.44;147.14;0;0;s;none;N;N;1;\r\n'.repeat(500);
  const more = () => {
    while (!socket.destroyed && socket.write(row));
  };
  socket.on('drain', more);
  more();
}

export const startCaster = (options: CasterOptions): Promise<Caster> => new Caster(options).listen();
