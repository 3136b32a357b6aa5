import { Worker } from 'node:worker_threads';
import type { EpochBatch, FromThread, LogTask, ToThread } from './log-messages.js';
import { workerFile } from './worker-file.js';

/** A log is read in one pass with little in memory; a thread that wants more than this has lost its way. */
const MEMORY = { maxOldGenerationSizeMb: 256, maxYoungGenerationSizeMb: 8 };

export type Outcome = Extract<FromThread, { kind: 'done' | 'failed' }> | { kind: 'stopped' };

/** One log being read in a thread of its own, so that nobody waits for it. */
export class LogThread {
  progress = 0;
  private readonly worker: Worker;
  private isStopped = false;

  constructor(task: LogTask) {
    // Not the options of this process: what a test runner adds to them would lead the thread to sources, which it cannot run.
    this.worker = new Worker(workerFile(), { workerData: task, execArgv: [], resourceLimits: MEMORY });
  }

  /** Ends when the thread has. Epochs for a rover's history go to `store`, which is awaited before the next come. */
  outcome(store: (batch: EpochBatch) => Promise<void>): Promise<Outcome> {
    return new Promise((resolve, reject) => {
      let outcome: Outcome | null = null;
      this.worker.on('message', (message: FromThread) => {
        if (message.kind === 'progress') this.progress = message.progress;
        else if (message.kind !== 'epochs') outcome = message;
        else
          store(message).then(
            () => this.worker.postMessage({ kind: 'stored' } satisfies ToThread, []),
            (error: unknown) => {
              reject(error);
              void this.stop();
            },
          );
      });
      this.worker.once('error', reject);
      this.worker.once('exit', () => {
        if (outcome && !this.isStopped) resolve(outcome);
        else if (this.isStopped) resolve({ kind: 'stopped' });
        else reject(new Error('the thread ended without a word'));
      });
    });
  }

  async stop(): Promise<void> {
    this.isStopped = true;
    await this.worker.terminate();
  }
}
