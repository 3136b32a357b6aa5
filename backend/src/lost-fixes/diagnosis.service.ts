import { Injectable } from '@nestjs/common';
import type { Diagnosis } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import type { RoverShift } from '../shifts/shifts.service.js';
import type { Episode } from './detector.js';
import { diagnose } from './diagnosis.js';
import type { Look } from './episode.keeper.js';
import { EvidenceReader } from './evidence.reader.js';
import type { LostFixRow } from './lost-fix.view.js';
import { LostFixWriter } from './lost-fix.writer.js';
import { OutageKeeper } from './outage.keeper.js';
import type { WatchedRover } from './watched-rover.js';

/** An open lost fix is explained anew this often. */
const RENEW_MS = 10_000;

/** Explains lost fixes while they are open; what was said at raising stays with them, and what was said last at closing. */
@Injectable()
export class DiagnosisService {
  constructor(
    private readonly evidence: EvidenceReader,
    private readonly writer: LostFixWriter,
    private readonly outages: OutageKeeper,
  ) {}

  of(rover: WatchedRover, episode: Episode, shift: RoverShift, { now, limits }: Look): Diagnosis {
    const outage = this.outages.evidenceFor(rover, episode.start);
    const evidence = this.evidence.read(rover.entry.roverId, episode, shift.start, now, rover.entry, outage);
    return { ...diagnose(evidence, limits), at: now };
  }

  isDue({ endAt, closedAt, diagnosis }: LostFixRow, now: number): boolean {
    return endAt === null && closedAt === null && now - (diagnosis?.at ?? 0) >= RENEW_MS;
  }

  renew(rover: WatchedRover, row: LostFixRow, episode: Episode, shift: RoverShift, look: Look): void {
    if (row.closedAt !== null) return;
    const diagnosis = this.of(rover, episode, shift, look);
    const sharedId = row.sharedId ?? this.outages.sharedIdFor(rover, episode.start);
    const diagnosisAtRaising = row.diagnosisAtRaising ?? diagnosis;
    this.writer.change(row.id, { diagnosis, diagnosisAtRaising, sharedId });
  }
}
