import type {
  DateSentence,
  DayNumber,
  GgaSentence,
  GstSentence,
  Sentence,
} from '@hubtack/contracts/nmea/sentence.js';
import { Dating, nearestTo } from './dating.js';
import type { Epoch, LateSigmas } from './epoch.js';

export interface AssembledEpoch {
  epoch: Epoch;
  line: number;
}

export interface Assembled {
  epochs: AssembledEpoch[];
  sigmas: LateSigmas[];
  /** Lines whose GGA has no time and is not of now: nobody can say when it was. */
  untimed: number[];
}

interface Waiting {
  gga: GgaSentence;
  gst: GstSentence | null;
  line: number;
  receivedAt: number;
  time: number | null;
  mayMove: boolean;
}

/** How long a live stream may keep a GGA back because its RMC or ZDA, which has the date, may be on its way. */
const WAIT_FOR_DATE_MS = 1000;
/** A stream this close to the clock is of now, so that a GGA without a time can be placed at its arrival. */
const LIVE_SLACK_MS = 60_000;
/** A leap in the time of day that only a date sentence can settle (a gap of twelve hours looks like one of none). */
const LEAP_MS = 3_600_000;

const nothing = (): Assembled => ({ epochs: [], sigmas: [], untimed: [] });

/**
 * Joins the sentences of one instant (GGA, its GST, the RMC or ZDA that dates it) into one dated epoch.
 * Joined on the UTC field, not on arrival order. One assembler reads one stream: a TCP connection
 * (call `settle` after each chunk), or one post or file (call only `finish`, so that a date anywhere in it counts).
 */
export class EpochAssembler {
  private readonly dating: Dating;
  private out = nothing();
  /** GGAs from before any date was known. */
  private undated: Waiting[] = [];
  /** The newest GGA: its GST or date may still come. */
  private pending: Waiting | null = null;
  private released: { timeOfDayMs: number; time: number } | null = null;
  /** A date sentence or GST that came before the GGA of its instant. */
  private early: { date: DateSentence | null; gst: GstSentence | null } = { date: null, gst: null };
  private byClock = false;

  constructor(statedDay: DayNumber | null = null) {
    this.dating = new Dating(statedDay);
  }

  push(sentence: Sentence, line: number, receivedAt: number): void {
    switch (sentence.type) {
      case 'gga':
        return this.pushGga(sentence, line, receivedAt);
      case 'date':
        return this.pushDate(sentence, receivedAt);
      case 'gst':
        return this.pushGst(sentence);
      case 'other':
      case 'fault':
        return;
    }
  }

  /** Hands on what need not wait; answers whether something still waits for a date. */
  settle(now: number): boolean {
    if (this.undated.length > 0) {
      if (now - this.undated[0]!.receivedAt < WAIT_FOR_DATE_MS) return true;
      this.dateByClock();
    }
    const waiting = this.pending;
    if (waiting && (waiting.mayMove || waiting.time === null)) {
      if (now - waiting.receivedAt < WAIT_FOR_DATE_MS) return true;
    }
    this.release();
    return false;
  }

  /** No more sentences will come. */
  finish(): void {
    if (this.undated.length > 0) this.dateByClock();
    this.release();
  }

  /** What has been assembled since the last call. */
  take(): Assembled {
    const out = this.out;
    this.out = nothing();
    return out;
  }

  private pushGga(gga: GgaSentence, line: number, receivedAt: number): void {
    this.release();
    const waiting: Waiting = { gga, gst: null, line, receivedAt, time: null, mayMove: false };
    const { date, gst } = this.early;
    this.early = { date: null, gst: null };
    if (gst && gst.timeOfDayMs === gga.timeOfDayMs) waiting.gst = gst;
    const timeOfDayMs = gga.timeOfDayMs ?? date?.timeOfDayMs ?? null;
    if (!this.dating.isDated && !this.byClock) {
      this.undated.push(waiting);
      return;
    }
    if (timeOfDayMs !== null) {
      waiting.mayMove = this.dating.jumpMs(timeOfDayMs, receivedAt) > LEAP_MS;
      waiting.time = this.dating.date(timeOfDayMs, receivedAt);
    }
    this.pending = waiting;
  }

  private pushDate(date: DateSentence, receivedAt: number): void {
    const time = this.dating.learn(date, receivedAt);
    if (this.undated.length > 0) {
      if (time !== null) this.dateBackwards(date, time);
      return;
    }
    const { pending } = this;
    if (pending && pending.gga.timeOfDayMs === null && pending.time === null && date.timeOfDayMs !== null) {
      pending.time = time ?? this.dating.date(date.timeOfDayMs, receivedAt);
    } else if (pending && pending.gga.timeOfDayMs === date.timeOfDayMs) {
      if (time !== null) pending.time = time;
      pending.mayMove = false;
    } else this.early.date = date;
  }

  private pushGst(gst: GstSentence): void {
    const at = gst.timeOfDayMs;
    const owner =
      this.pending?.gga.timeOfDayMs === at
        ? this.pending
        : this.undated.findLast((waiting) => waiting.gga.timeOfDayMs === at);
    if (owner) owner.gst = gst;
    else if (this.released && this.released.timeOfDayMs === at) {
      const { sigmaLatitudeM, sigmaLongitudeM, sigmaAltitudeM } = gst;
      this.out.sigmas.push({ time: this.released.time, sigmaLatitudeM, sigmaLongitudeM, sigmaAltitudeM });
    } else this.early.gst = gst;
  }

  /** The first date of a stream also dates what came before it, going back from instant to instant. */
  private dateBackwards(date: DateSentence, time: number): void {
    let after = time;
    for (const waiting of this.undated.toReversed()) {
      const isNewest = waiting === this.undated.at(-1);
      const timeOfDayMs = waiting.gga.timeOfDayMs ?? (isNewest ? date.timeOfDayMs : null);
      if (timeOfDayMs === null) continue;
      waiting.time = nearestTo(timeOfDayMs, after);
      after = waiting.time;
    }
    this.passOnUndated();
  }

  private dateByClock(): void {
    this.byClock = true;
    for (const waiting of this.undated) {
      const { timeOfDayMs } = waiting.gga;
      if (timeOfDayMs !== null) waiting.time = this.dating.date(timeOfDayMs, waiting.receivedAt);
    }
    this.passOnUndated();
  }

  /** All but the newest are complete. */
  private passOnUndated(): void {
    for (const waiting of this.undated) {
      this.release();
      this.pending = waiting;
    }
    this.undated = [];
  }

  private release(): void {
    const waiting = this.pending;
    if (!waiting) return;
    this.pending = null;
    const time = waiting.time ?? (this.dating.isLive(LIVE_SLACK_MS) ? waiting.receivedAt : null);
    if (time === null) {
      this.out.untimed.push(waiting.line);
      return;
    }
    const { gga, gst } = waiting;
    this.released = gga.timeOfDayMs === null ? null : { timeOfDayMs: gga.timeOfDayMs, time };
    this.out.epochs.push({
      line: waiting.line,
      epoch: {
        time,
        quality: gga.quality,
        satellites: gga.satellites,
        hdop: gga.hdop,
        ageMs: gga.ageMs,
        stationId: gga.stationId,
        latitude: gga.latitude,
        longitude: gga.longitude,
        altitudeM: gga.altitudeM,
        geoidSeparationM: gga.geoidSeparationM,
        sigmaLatitudeM: gst?.sigmaLatitudeM ?? null,
        sigmaLongitudeM: gst?.sigmaLongitudeM ?? null,
        sigmaAltitudeM: gst?.sigmaAltitudeM ?? null,
      },
    });
  }
}
