import { Global, Injectable, Module } from '@nestjs/common';

/** The one source of "now", so that tests can move it. Milliseconds UTC. */
@Injectable()
export class Clock {
  now(): number {
    return Date.now();
  }
}

@Global()
@Module({ providers: [Clock], exports: [Clock] })
export class ClockModule {}
