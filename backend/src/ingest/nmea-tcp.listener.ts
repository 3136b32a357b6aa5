import { createServer, type Server, type Socket } from 'node:net';
import {
  Inject,
  Injectable,
  Logger,
  type BeforeApplicationShutdown,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import { Changes } from '../common/changes.js';
import { Clock } from '../common/clock.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { MetricsService } from '../metrics/metrics.service.js';
import { IngestService } from './ingest.service.js';
import { NmeaTcpConnection } from './nmea-tcp.connection.js';
import { RoverKeyService } from './rover-key.service.js';

/** Connections at once. One more is told so and closed: the server keeps its files for those that work. */
const MAX_CONNECTIONS = 4000;

/** For receivers and loggers that can open a plain stream: first line `KEY <rover key>`, then sentences. */
@Injectable()
export class NmeaTcpListener implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger(NmeaTcpListener.name);
  private readonly connections = new Set<NmeaTcpConnection>();
  private server: Server | null = null;

  constructor(
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly ingest: IngestService,
    private readonly keys: RoverKeyService,
    private readonly clock: Clock,
    private readonly metrics: MetricsService,
    changes: Changes,
  ) {
    changes.all.subscribe((change) => {
      if (change.kind !== 'roverKeys' && change.kind !== 'firm') return;
      for (const connection of this.connections) connection.checkKey();
    });
  }

  /** The port that is listened on; null when the listener is off. */
  get port(): number | null {
    const address = this.server?.address();
    return typeof address === 'object' && address ? address.port : null;
  }

  async onApplicationBootstrap(): Promise<void> {
    if (this.environment.NMEA_TCP_PORT === 0 && this.environment.NODE_ENV !== 'test') return;
    const server = createServer({ noDelay: true, keepAlive: true }, (socket) => this.accept(socket));
    this.server = server;
    await new Promise<void>((resolve, reject) => {
      server.once('error', reject);
      server.listen(this.environment.NMEA_TCP_PORT, this.environment.HOST, () => {
        server.off('error', reject);
        resolve();
      });
    });
    server.on('error', (error) => this.logger.error({ err: error }, 'TCP listener'));
    this.logger.log({ port: this.port }, 'listening for sentences over TCP');
  }

  /** Lets connections hand over what they have, before the commit queue drains. */
  async beforeApplicationShutdown(): Promise<void> {
    this.server?.close();
    await Promise.all([...this.connections].map((connection) => connection.stop()));
  }

  private accept(socket: Socket): void {
    if (this.connections.size >= MAX_CONNECTIONS) {
      socket.on('error', () => socket.destroy());
      socket.end('ERROR too many connections\r\n');
      return;
    }
    const connection = new NmeaTcpConnection(socket, this.ingest, this.keys, this.clock);
    this.connections.add(connection);
    this.metrics.ingestConnections.set(this.connections.size);
    socket.once('close', () => {
      this.connections.delete(connection);
      this.metrics.ingestConnections.set(this.connections.size);
    });
  }
}
