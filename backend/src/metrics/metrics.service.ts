import { Injectable } from '@nestjs/common';
import { Counter, Gauge, Histogram, Registry, collectDefaultMetrics } from 'prom-client';

/** What the server counts about itself, in Prometheus' terms. One registry for each application. */
@Injectable()
export class MetricsService {
  readonly registry = new Registry();

  readonly epochsAccepted = new Counter({
    name: 'hubtack_epochs_accepted_total',
    help: 'Fix epochs stored',
    registers: [this.registry],
  });
  readonly rejects = new Counter({
    name: 'hubtack_rejects_total',
    help: 'Sentences and epochs refused, by reason',
    labelNames: ['reason'] as const,
    registers: [this.registry],
  });
  readonly commitSeconds = new Histogram({
    name: 'hubtack_commit_seconds',
    help: 'Time of one group commit',
    buckets: [0.001, 0.002, 0.005, 0.01, 0.025, 0.05, 0.1, 0.25, 1],
    registers: [this.registry],
  });
  readonly commitQueue = new Gauge({
    name: 'hubtack_commit_queue_epochs',
    help: 'Epochs waiting to be stored',
    registers: [this.registry],
  });
  readonly streamReaders = new Gauge({
    name: 'hubtack_stream_readers',
    help: 'Boards that are connected',
    registers: [this.registry],
  });
  readonly streamLagging = new Gauge({
    name: 'hubtack_stream_lagging_readers',
    help: 'Boards that read more slowly than frames are made',
    registers: [this.registry],
  });
  readonly ingestConnections = new Gauge({
    name: 'hubtack_ingest_connections',
    help: 'Open TCP connections of rovers',
    registers: [this.registry],
  });

  readonly outboxWaiting = new Gauge({
    name: 'hubtack_outbox_waiting_mails',
    help: 'Mails that the mail server has not taken yet',
    registers: [this.registry],
  });

  constructor() {
    collectDefaultMetrics({ register: this.registry });
  }
}
