import { Global, Injectable, Module } from '@nestjs/common';
import { Subject } from 'rxjs';

/** What one module tells the others after it has committed. */
export type Change =
  /** Names, assignments, sites, patterns, shifts or settings changed: lanes are described anew. */
  | { kind: 'firm' }
  /** Shift marks of a crew changed, between these instants. */
  | { kind: 'marks'; crewId: number; from: number; to: number }
  /** A rover went to another crew, or to none, from this instant on. */
  | { kind: 'assignment'; roverId: number; from: number }
  /** What is known of these lost fixes changed. */
  | { kind: 'lostFix'; lostFixIds: number[] }
  /** The work of a crew is judged by another tolerance profile. */
  | { kind: 'crewProfile'; crewId: number }
  /** These local days became holidays, or are none any more. */
  | { kind: 'holidays'; days: string[] }
  /** A rover's keys changed. */
  | { kind: 'roverKeys'; roverId: number }
  /** These sign-ins no longer count, or count with another role. */
  | { kind: 'sessions'; sessionIds: string[] };

@Injectable()
export class Changes {
  private readonly subject = new Subject<Change>();
  readonly all = this.subject.asObservable();

  /** What waits for the transaction around it; null outside of one. */
  private held: Change[] | null = null;

  announce(change: Change): void {
    if (this.held) this.held.push(change);
    else this.subject.next(change);
  }

  /** Runs a transaction that others announce from within: they are heard once it holds, and not at all when it does not. */
  onceItHolds<T>(transaction: () => T): T {
    const outer = this.held;
    const held: Change[] = [];
    this.held = held;
    let result: T;
    try {
      result = transaction();
    } finally {
      this.held = outer;
    }
    for (const change of held) this.announce(change);
    return result;
  }
}

@Global()
@Module({ providers: [Changes], exports: [Changes] })
export class ChangesModule {}
