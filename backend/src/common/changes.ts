import { Global, Injectable, Module } from '@nestjs/common';
import { Subject } from 'rxjs';

/** What one module tells the others after it has committed. */
export type Change =
  /** Names, assignments, sites, patterns, shifts or settings changed: lanes are described anew. */
  | { kind: 'firm' }
  /** Shift marks of a crew changed, from this instant on. */
  | { kind: 'marks'; crewId: number; from: number }
  /** What is known of these lost fixes changed. */
  | { kind: 'lostFix'; lostFixIds: number[] }
  /** A rover's keys changed. */
  | { kind: 'roverKeys'; roverId: number }
  /** These sign-ins no longer count, or count with another role. */
  | { kind: 'sessions'; sessionIds: string[] };

@Injectable()
export class Changes {
  private readonly subject = new Subject<Change>();
  readonly all = this.subject.asObservable();

  announce(change: Change): void {
    this.subject.next(change);
  }
}

@Global()
@Module({ providers: [Changes], exports: [Changes] })
export class ChangesModule {}
