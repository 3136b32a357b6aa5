import { meQuery } from '../lib/session';
import { queryClient } from '../lib/query-client';
import { dismissed, type DrainEnd } from './queue';
import { sendTap } from './send-tap';
import type { NewTap, Tap } from './tap';
import { TapRunner } from './tap-runner';
import { KeptTaps } from './tap-store';

export interface TapsShown {
  taps: readonly Tap[];
  /** The server knows nobody here any more: what waits goes out after the next sign-in. */
  needsSignIn: boolean;
}

type OnDone = (tap: Tap, answer: unknown) => Promise<void>;

const whose = (): number | null => queryClient.getQueryData(meQuery.queryKey)?.userId ?? null;

/** The one queue of this tab, over the storage that all tabs share. Made when the first page asks for it. */
class Taps {
  private shown: TapsShown = { taps: [], needsSignIn: false };
  private readonly store = new KeptTaps();
  private readonly listeners = new Set<() => void>();
  private readonly channel = new BroadcastChannel('hubtack.taps');
  private readonly doers = new Set<OnDone>();
  private readonly runner = new TapRunner(
    {
      store: {
        all: () => this.store.all(),
        add: (taps) => this.store.add(taps),
        settle: async (gone, changed) => {
          await this.store.settle(gone, changed);
          await this.changed();
        },
      },
      send: sendTap,
      whose,
      onDone: async (tap, answer) => {
        for (const each of this.doers) await each(tap, answer);
      },
    },
    (end) => this.ended(end),
  );

  constructor() {
    this.channel.addEventListener('message', () => void this.read());
    void this.read();
    this.runner.start();
  }

  /** Kept first, sent then. Throws when the phone cannot keep them, so that the person knows. */
  async add(taps: readonly NewTap[]): Promise<void> {
    await this.store.add(taps);
    await this.changed();
    this.runner.nudge();
  }

  async dismiss(id: string): Promise<void> {
    await this.store.settle(dismissed(await this.store.all(), id), []);
    await this.changed();
  }

  readonly nudge = (): void => this.runner.nudge();

  /** Who wants the answers; returns how to stop. */
  onDone(each: OnDone): () => void {
    this.doers.add(each);
    return () => this.doers.delete(each);
  }

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };
  readonly getShown = (): TapsShown => this.shown;

  private async changed(): Promise<void> {
    // A channel reaches its own origin only; the rule takes it for a window.
    // oxlint-disable-next-line unicorn/require-post-message-target-origin
    this.channel.postMessage('changed');
    await this.read();
  }

  private async read(): Promise<void> {
    this.show({ ...this.shown, taps: await this.store.all().catch(() => []) });
  }

  private ended(end: DrainEnd): void {
    const needsSignIn = end.kind === 'signIn';
    if (needsSignIn !== this.shown.needsSignIn) this.show({ ...this.shown, needsSignIn });
  }

  private show(shown: TapsShown): void {
    this.shown = shown;
    for (const each of this.listeners) each();
  }
}

export const taps = new Taps();
