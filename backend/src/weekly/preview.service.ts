import { Injectable } from '@nestjs/common';
import type { Preview, PreviewBody } from '@hubtack/contracts/weekly/preview.js';
import type { ToleranceProfile } from '@hubtack/contracts/weekly/tolerance-profile.js';
import { DateTime } from 'luxon';
import { Clock } from '../common/clock.js';
import { isoWeekOf, localDayOf } from '../common/local-day.js';
import { FixesService } from '../fixes/fixes.service.js';
import { HOLD_MS } from '../fixes/timeline.js';
import { detectorLimitsOf } from '../lost-fixes/detector.js';
import { SettingsService } from '../settings/settings.service.js';
import { ShiftsService } from '../shifts/shifts.service.js';
import { partFigures } from './part-figures.js';
import { ShiftFiguresRepository, type NamedShiftFigures } from './shift-figures.repository.js';
import { CrewProfiles } from './crew-profiles.js';
import { withinSpans } from './tolerance.js';
import { weekFigures } from './week-figures.js';

/** Rover-shifts that are worked out for a preview: beyond that it speaks for a part of the week. */
const MOST = 400;

/** What other limits or another profile would make of the last whole week. Nothing is written. */
@Injectable()
export class PreviewService {
  constructor(
    private readonly figures: ShiftFiguresRepository,
    private readonly fixes: FixesService,
    private readonly shifts: ShiftsService,
    private readonly settings: SettingsService,
    private readonly crewProfiles: CrewProfiles,
    private readonly clock: Clock,
  ) {}

  preview(body: PreviewBody): Preview {
    const { timeZone: zone } = this.settings.get();
    const now = this.clock.now();
    const week = isoWeekOf(DateTime.fromMillis(now, { zone }).minus({ weeks: 1 }).toMillis(), zone);
    const before = this.figures.ofWeek(week).slice(0, MOST);
    const profileOf = this.crewProfiles.of(body);
    const after = before.map((row) => this.asItWouldBe(row, body, profileOf(row.crewId), zone, now));
    return {
      week,
      before: weekFigures(before, true),
      after: weekFigures(after, true),
      shifts: this.figures.count(),
    };
  }

  private asItWouldBe(
    row: NamedShiftFigures,
    { limits }: PreviewBody,
    profile: ToleranceProfile,
    zone: string,
    now: number,
  ): NamedShiftFigures {
    const { roverId, crewId, shiftStart } = row;
    const day = localDayOf(row.startAt, zone);
    const shift = this.shifts
      .roverShifts(roverId, day, zone)
      .find((one) => one.start === shiftStart && one.crewId === crewId);
    if (!shift) return row;
    const spans = this.fixes.spans(roverId, shift.start, Math.min(shift.end ?? now, now));
    const epochs = this.fixes.epochs(roverId, day.start - HOLD_MS, day.end);
    const stored = this.figures.withinSpans(roverId, day);
    // Without raw epochs nobody can say what another profile would make of it.
    const within = epochs.length > 0 ? withinSpans(epochs, profile, day) : stored;
    const part = partFigures(shift, day, spans, within, now, detectorLimitsOf(limits));
    if (!part) return row;
    const { totals, ...figures } = part;
    return { ...row, ...totals, ...figures };
  }
}
