import type { Socket } from 'node:net';
import type { CheckReport, CheckStepName } from '@hubtack/contracts/corrections/check.js';
import type { CorrectionFormat } from '@hubtack/contracts/corrections/correction-source.js';
import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { writeGga } from '@hubtack/contracts/nmea/sentence-writer.js';
import { resolveOnce, type Lookup, type Resolved } from '../ntrip/addresses.js';
import { openConnection } from '../ntrip/connection.js';
import { NtripProblem } from '../ntrip/problem.js';
import { withDistances } from '../ntrip/read-source-table.js';
import { askForTable, tableOf, type TableFound, type TableLimits } from '../ntrip/table-answer.js';
import { checkedBase, type BaseBefore } from './base.js';
import { judgeFormats } from './formats.js';
import { judgeBase, judgeData, judgePosition, judgeRefusal, judgeSilence } from './judge.js';
import { Progress } from './report.js';
import { nearestSpellings } from './spellings.js';
import { tableWords } from './table-words.js';
import { lookAtStream, type Look, type LookLimits } from './stream-look.js';

/** What is checked, and what it is compared with. */
export interface CheckTarget {
  address: string;
  port: number;
  mountPoint: string;
  user: string | null;
  password: string | null;
  ntripVersion: 1 | 2;
  tls: boolean;
  /** Send a position, as a rover on this source would. */
  sendPosition: boolean;
  expectedFormat: CorrectionFormat;
  /** What distances count from, and what is sent; null when no site or rover was named. */
  place: { latitude: number; longitude: number } | null;
  /** The base at the last check that read one. */
  before: BaseBefore | null;
  /** Private, loopback and link-local addresses may be connected to. */
  allowPrivate: boolean;
}

export interface CheckTimeLimits extends TableLimits, LookLimits {
  addressMs: number;
  connectMs: number;
}

const usual: CheckTimeLimits = {
  addressMs: 5000,
  connectMs: 8000,
  firstReplyMs: 10_000,
  tableMs: 15_000,
  idleMs: 3000,
  firstByteMs: 15_000,
  lookMs: 12_000,
  longLookMs: 35_000,
  stallMs: 6000,
};

interface CheckOptions {
  signal: AbortSignal;
  onReport: (report: CheckReport) => void;
  limits?: Partial<CheckTimeLimits>;
  lookup?: Lookup;
}

/** A step has failed, and with it the check. */
class StepFailed extends Error {}

/**
 * Walks from the name of a caster to the position of its base, telling of every change. The answer is the whole report; a failed step
 * is no error. Rejects with the signal's reason when it is cancelled. Asks twice at most: for the table, and for the stream.
 */
export async function runCheck(target: CheckTarget, options: CheckOptions): Promise<CheckReport> {
  const walk = new Walk(target, options);
  try {
    await walk.run();
  } catch (error) {
    if (!(error instanceof StepFailed)) {
      walk.progress.skipRest('Cancelled.');
      throw error;
    }
    walk.progress.skipRest('An earlier step failed.');
  }
  return walk.progress.current;
}

class Walk {
  readonly progress: Progress;
  private readonly limits: CheckTimeLimits;
  private readonly now = () => Math.round(performance.now());

  constructor(
    private readonly target: CheckTarget,
    private readonly options: CheckOptions,
  ) {
    this.limits = { ...usual, ...options.limits };
    this.progress = new Progress(this.now, options.onReport);
  }

  async run(): Promise<void> {
    const { progress } = this;
    progress.begin('address');
    const to = await this.step('address', this.resolve());
    progress.pass('address', `${this.target.address} is ${to.address}.`);
    progress.begin('connection');
    const socket = await this.step('connection', this.connect(to));
    progress.pass(
      'connection',
      `Connected to port ${this.target.port}${this.target.tls ? ', over TLS' : ''}.`,
    );
    const table = await this.readTable(socket);
    const listed = this.findMountPoint(table);
    const look = await this.lookAt(to, listed);
    this.judge(look, listed);
  }

  /** A problem fails the step. */
  private async step<T>(name: CheckStepName, work: Promise<T>): Promise<T> {
    try {
      return await work;
    } catch (error) {
      if (error instanceof NtripProblem) this.fail(name, error.message, error.toTry);
      throw error;
    }
  }

  private fail(name: CheckStepName, seen: string, toTry: string, warnings: string[] = []): never {
    this.progress.fail(name, seen, toTry, warnings);
    throw new StepFailed(name);
  }

  private async within<T>(
    ms: number,
    work: (signal: AbortSignal) => Promise<T>,
    late: () => NtripProblem,
  ): Promise<T> {
    const { signal } = this.options;
    signal.throwIfAborted();
    const inTime = new AbortController();
    const timer = setTimeout(() => inTime.abort(late()), ms);
    const both = AbortSignal.any([signal, inTime.signal]);
    try {
      return await Promise.race([
        work(both),
        new Promise<never>((_, reject) => {
          both.addEventListener('abort', () => reject(both.reason as Error), { once: true });
        }),
      ]);
    } finally {
      clearTimeout(timer);
    }
  }

  private resolve(): Promise<Resolved> {
    const { address, allowPrivate } = this.target;
    return this.within(
      this.limits.addressMs,
      () => resolveOnce(address, allowPrivate, this.options.lookup),
      () => new NtripProblem(`The name ${address} could not be looked up in time.`, 'Check the address.'),
    );
  }

  private connect(to: Resolved): Promise<Socket> {
    const { address, port, tls } = this.target;
    const where = `${address} does not answer at port ${port}`;
    return this.within(
      this.limits.connectMs,
      (signal) => openConnection(this.target, to, signal),
      () =>
        new NtripProblem(
          tls ? `${where}, or does not speak TLS there.` : `${where}.`,
          'Check address and port: 2101 is usual. A firewall may be in the way.',
        ),
    );
  }

  private async readTable(socket: Socket): Promise<TableFound> {
    const { progress, target } = this;
    progress.begin('sourceTable');
    const { ntripVersion: version, address, port } = target;
    const request = { version, mountPoint: null, address, port, login: null, gga: null };
    const answer = await askForTable(socket, request, this.limits, this.options.signal);
    const found = await this.step(
      'sourceTable',
      Promise.resolve().then(() => tableOf(answer, address)),
    );
    const seen = found.table
      ? tableWords(found.table.records)
      : 'No table is shown; the stream itself decides.';
    progress.pass('sourceTable', seen, found.warnings);
    return found;
  }

  private findMountPoint({ table }: TableFound): MountPoint | null {
    const { progress, target } = this;
    progress.begin('mountPoint');
    if (!table) {
      progress.see('mountPoint', 'Asked for directly.');
      return null;
    }
    const mountPoints = withDistances(table.mountPoints, target.place);
    const distances = new Map(mountPoints.map((one) => [one.mountPoint, one.distanceM]));
    const suggestion = (mountPoint: string) => ({ mountPoint, distanceM: distances.get(mountPoint) ?? null });
    progress.add({
      nearest: mountPoints
        .filter(({ distanceM }) => distanceM !== null)
        .toSorted((a, b) => a.distanceM! - b.distanceM!)
        .slice(0, NEAREST)
        .map(({ mountPoint }) => suggestion(mountPoint)),
    });
    const listed = mountPoints.find(({ mountPoint }) => mountPoint === target.mountPoint);
    if (listed) {
      progress.pass('mountPoint', [listed.identifier, listed.format].filter(Boolean).join(', ') || 'Listed.');
      return listed;
    }
    const spellings = nearestSpellings(
      target.mountPoint,
      mountPoints.map(({ mountPoint }) => mountPoint),
      (name) => distances.get(name) ?? null,
    );
    progress.add({ spellings: spellings.map(suggestion) });
    return this.fail(
      'mountPoint',
      `There is no mount point ${target.mountPoint} in the source table.`,
      spellings[0] === undefined
        ? 'Choose one from the list of mount points.'
        : `Compare it letter by letter: ${spellings[0]} is the nearest spelling.`,
    );
  }

  private async lookAt(to: Resolved, listed: MountPoint | null): Promise<Look> {
    const { progress, target } = this;
    progress.begin('login');
    const { user, password, ntripVersion: version, address, port, mountPoint } = target;
    const login = user === null ? null : { user, password: password ?? '' };
    const gga = () => this.position();
    const socket = await this.step('connection', this.connect(to));
    const look = await lookAtStream(
      socket,
      { version, mountPoint, address, port, login, gga: gga() },
      this.limits,
      {
        signal: this.options.signal,
        now: this.now,
        gga,
        onAccepted: () => {
          if (!listed) progress.pass('mountPoint', 'The caster has it.');
          progress.pass('login', login ? 'The login is accepted.' : 'No login is asked for.');
          progress.begin('data');
        },
        onData: (meter) => progress.add({ stream: meter.figures(this.now()) }),
      },
    );
    if (look.meter.hasBytes) progress.add({ stream: look.meter.figures(this.now()) });
    return look;
  }

  /** Where the rover would say it is; null when it is not to be said, or not known. */
  private position(): string | null {
    const { sendPosition, place } = this.target;
    if (!sendPosition || !place) return null;
    return writeGga({
      talker: 'GP',
      time: Date.now(),
      ...place,
      quality: 1,
      satellites: 12,
      hdop: 1,
      altitudeM: 0,
      geoidSeparationM: 0,
      ageSeconds: null,
      stationId: null,
    });
  }

  private judge(look: Look, listed: MountPoint | null): void {
    const { target, progress } = this;
    const hasSent = target.sendPosition && target.place !== null;
    if (look.head === null || (look.end === 'silent' && !look.meter.hasBytes)) {
      const { step, seen, toTry } = judgeSilence(look, target, listed, hasSent);
      if (step === 'position') progress.skip('data', 'Nothing came.');
      this.fail(step, seen, toTry);
    }
    if (look.end === 'refused') {
      const { step, seen, toTry } = judgeRefusal(look.head, target);
      this.fail(step, seen, toTry);
    }
    const stream = look.meter.figures(this.now());
    const data = judgeData(look, stream);
    if (!data.passed) this.fail('data', data.seen, data.toTry, data.warnings);
    progress.pass('data', data.seen, data.warnings);
    progress.begin('formats');
    const formats = judgeFormats(stream, target.expectedFormat, listed, look.lookedMs);
    if (!formats.passed) this.fail('formats', formats.seen, formats.toTry, formats.warnings);
    progress.pass('formats', formats.seen, formats.warnings);
    progress.begin('position');
    const position = judgePosition(target, listed, hasSent);
    progress.pass('position', position.seen, position.warnings);
    progress.begin('base');
    const base = checkedBase(look.meter.station!, listed, target.place, target.before);
    progress.add({ base });
    const verdict = judgeBase(base);
    if (!verdict.passed) this.fail('base', verdict.seen, verdict.toTry, verdict.warnings);
    progress.pass('base', verdict.seen, verdict.warnings);
  }
}

/** So many mount points by distance are enough to choose from; the list has them all. */
const NEAREST = 5;
