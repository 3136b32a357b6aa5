import { Inject, Injectable } from '@nestjs/common';
import { DAY_MS } from '@hubtack/contracts/nmea/sentence.js';
import { baseDistance } from '../common/base-distance.js';
import type { Interval } from '../common/interval.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import type { RosterEntry } from '../rovers/roster.repository.js';
import { FixesService } from '../fixes/fixes.service.js';
import type { Episode } from './detector.js';
import type { Evidence } from './diagnosis.js';
import { evidenceWindow } from './evidence-window.js';

type Source = Pick<RosterEntry, 'baseLatitude' | 'baseLongitude' | 'sourceDownSince' | 'mountPoint'>;

/** Gathers what is known about a loss from the stored epochs. */
@Injectable()
export class EvidenceReader {
  /** For each rover's shift: up to where its epochs have been looked through, and when corrections first came. */
  private readonly looked = new Map<number, { shiftStart: number; until: number; at: number | null }>();

  private readonly rawMs: number;

  constructor(
    private readonly fixes: FixesService,
    @Inject(ENVIRONMENT) environment: Environment,
  ) {
    this.rawMs = environment.RAW_EPOCH_DAYS * DAY_MS;
  }

  read(
    roverId: number,
    episode: Pick<Episode, 'kind' | 'start' | 'end'>,
    shiftStart: number,
    now: number,
    source: Source,
    outage: Evidence['outage'],
  ): Evidence {
    const { kind, start, end } = episode;
    const until = end ?? now;
    // Raw epochs of that time are gone: there is nothing to look through.
    if (until < now - this.rawMs)
      return {
        kind,
        start,
        now: until,
        before: [],
        since: [],
        correctedAt: null,
        baseDistanceM: null,
        outage,
        sourceDown: null,
      };
    const { before, since } = evidenceWindow(episode, shiftStart, until);
    const read = (window: Interval) => this.fixes.epochs(roverId, window.start, window.end);
    return {
      kind,
      start,
      now: until,
      before: before ? read(before) : [],
      since: since.flatMap(read),
      correctedAt: this.correctedAt(roverId, shiftStart, until),
      baseDistanceM: this.distance(roverId, source),
      outage,
      sourceDown: sourceDownAt(source, until),
    };
  }

  /** Sentences from this instant on have come late: they are looked through again. */
  forgetSince(roverId: number, from: number): void {
    const known = this.looked.get(roverId);
    if (known && from < known.until) this.looked.delete(roverId);
  }

  /** Goes through the epochs of a shift once; what has been looked through is not looked at again. */
  private correctedAt(roverId: number, shiftStart: number, until: number): number | null {
    const known = this.looked.get(roverId);
    const goesOn = known?.shiftStart === shiftStart ? known : { shiftStart, until: shiftStart, at: null };
    if (goesOn.at !== null || until <= goesOn.until) return goesOn.at;
    const first = this.fixes
      .epochs(roverId, goesOn.until, until)
      .find(({ quality, stationId }) => quality === 4 || quality === 5 || stationId !== null);
    const at = first?.time ?? null;
    this.looked.set(roverId, { shiftStart, until, at });
    return at;
  }

  private distance(roverId: number, { baseLatitude, baseLongitude }: Source): number | null {
    const latest = this.fixes.latest(roverId);
    if (latest?.latitude == null || latest.longitude === null) return null;
    if (baseLatitude === null || baseLongitude === null) return null;
    return baseDistance(latest.latitude, latest.longitude, baseLatitude, baseLongitude);
  }
}

function sourceDownAt({ sourceDownSince, mountPoint }: Source, at: number): Evidence['sourceDown'] {
  if (sourceDownSince === null || mountPoint === null || sourceDownSince > at) return null;
  return { since: sourceDownSince, mountPoint };
}
