import { openDB, type DBSchema, type IDBPDatabase } from 'idb';
import type { NewTap, Tap, TapStore } from './tap';

interface Kept extends DBSchema {
  taps: { key: number; value: NewTap & { order?: number }; indexes: { id: string } };
}

/** Taps in IndexedDB: they outlive the page and the browser. */
export class KeptTaps implements TapStore {
  private opening: Promise<IDBPDatabase<Kept>> | null = null;

  async all(): Promise<Tap[]> {
    const database = await this.open();
    // By key, which is the order of arrival over all tabs.
    return (await database.getAll('taps')) as Tap[];
  }

  async add(taps: readonly NewTap[]): Promise<void> {
    const transaction = (await this.open()).transaction('taps', 'readwrite');
    await Promise.all([...taps.map((tap) => transaction.store.add(tap)), transaction.done]);
  }

  async settle(gone: readonly string[], changed: readonly Tap[]): Promise<void> {
    const transaction = (await this.open()).transaction('taps', 'readwrite');
    const keys = await Promise.all(gone.map((id) => transaction.store.index('id').getKey(id)));
    await Promise.all([
      ...keys.filter((key) => key !== undefined).map((key) => transaction.store.delete(key)),
      ...changed.map((tap) => transaction.store.put(tap)),
      transaction.done,
    ]);
  }

  private open(): Promise<IDBPDatabase<Kept>> {
    this.opening ??= openDB<Kept>('hubtack', 1, {
      upgrade: (database) => {
        const taps = database.createObjectStore('taps', { keyPath: 'order', autoIncrement: true });
        taps.createIndex('id', 'id', { unique: true });
      },
      terminated: () => {
        this.opening = null;
      },
    }).catch((cause: unknown) => {
      this.opening = null;
      throw new Error('This phone cannot keep anything for this page; nothing was sent.', { cause });
    });
    return this.opening;
  }
}
