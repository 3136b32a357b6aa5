/** Something a person tapped, kept on the phone until the server has answered for it. */
export interface Tap {
  /** Its place among all taps of this phone; given by the store. */
  order: number;
  /** Sent as Idempotency-Key: however often it is sent, it happens once. */
  id: string;
  /** Who tapped; nobody else's sign-in sends it. */
  userId: number;
  at: number;
  /** What it is called while it waits. */
  words: string;
  kind: 'flag' | 'photo' | 'shift' | 'setUp';
  /** `:under` stands for the id that the tap it hangs under has yet to be given. */
  url: string;
  body: Blob | object;
  /** Id of the tap that must have been answered first; null when it may go. */
  under: string | null;
  /** Why the server would not have it; null while it waits. */
  refusal: string | null;
}
export type NewTap = Omit<Tap, 'order'>;

/** What became of one sending. */
export type Outcome =
  | { kind: 'done'; answer: unknown; answerId: number }
  /** No signal, or a server that is busy: the tap stays where it is. */
  | { kind: 'later'; waitMs: number | null }
  | { kind: 'refused'; reason: string }
  | { kind: 'signIn' };

export interface TapStore {
  /** In their order. */
  all(): Promise<Tap[]>;
  /** All or none. */
  add(taps: readonly NewTap[]): Promise<void>;
  /** All or none. */
  settle(gone: readonly string[], changed: readonly Tap[]): Promise<void>;
}
