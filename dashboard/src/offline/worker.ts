/**
 * The service worker that keeps this page openable without signal (built by vite-plugin-pwa). It is asked for by the page that
 * needs it: desks in the office go without.
 */
class Worker {
  private waiting: ServiceWorker | null = null;
  private isTaking = false;
  private kept: readonly string[] = [];
  private readonly listeners = new Set<() => void>();

  constructor() {
    if (!import.meta.env.PROD || !('serviceWorker' in navigator)) return;
    navigator.serviceWorker.addEventListener('controllerchange', () => this.tookOver());
    void this.register();
  }

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => this.listeners.delete(listener);
  };
  readonly hasNewVersion = (): boolean => this.waiting !== null;

  readonly takeNewVersion = (): void => {
    this.isTaking = true;
    this.waiting?.postMessage({ type: 'SKIP_WAITING' });
  };

  /**
   * Answers that the page must have without signal are asked for once more through the worker: the first page of all came before
   * it, and signing in empties what it keeps.
   */
  readonly keep = (paths: readonly string[]): void => {
    this.kept = paths;
    if (!import.meta.env.PROD || !navigator.serviceWorker?.controller) return;
    for (const path of paths) {
      // Read to its end: a body left lying keeps the worker busy, and a newer one from coming.
      fetch(path, { credentials: 'same-origin' })
        .then((answer) => answer.arrayBuffer())
        .catch(() => undefined);
    }
  };

  private async register(): Promise<void> {
    const registration = await navigator.serviceWorker.register('/sw.js').catch(() => null);
    if (!registration) return;
    this.look(registration);
    registration.addEventListener('updatefound', () => {
      registration.installing?.addEventListener('statechange', () => this.look(registration));
    });
    // A phone keeps the page for days: it would seldom ask by itself.
    const ask = () => registration.update().catch(() => undefined);
    document.addEventListener('visibilitychange', () => {
      if (document.visibilityState === 'visible') void ask();
    });
    await ask();
  }

  /** The very first one is no new version: nothing older is running. */
  private look(registration: ServiceWorkerRegistration): void {
    this.waiting = navigator.serviceWorker.controller ? registration.waiting : null;
    for (const listener of this.listeners) listener();
  }

  private tookOver(): void {
    if (this.isTaking) location.reload();
    else this.keep(this.kept);
  }
}

export const worker = new Worker();
