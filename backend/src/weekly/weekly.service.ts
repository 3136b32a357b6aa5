import { Injectable } from '@nestjs/common';
import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { WeekCause, WeekFigures, Weekly } from '@hubtack/contracts/weekly/weekly.js';
import { DateTime } from 'luxon';
import { Clock } from '../common/clock.js';
import { isoWeekInterval, isoWeekOf } from '../common/local-day.js';
import type { Interval } from '../common/interval.js';
import { ProblemException } from '../common/problem.exception.js';
import { SettingsService } from '../settings/settings.service.js';
import { FiguresKeeper } from './figures.keeper.js';
import { LostTimeRepository, type LostTime } from './lost-time.repository.js';
import { ShiftFiguresRepository, type NamedShiftFigures, type WeekSum } from './shift-figures.repository.js';
import { weekFigures, weekShiftOf } from './week-figures.js';
import { groupKeyOf, weekSentence, type LostGroup } from './week-sentence.js';

const TWELVE = 12;
const FOUR = 4;
const byName = new Intl.Collator();
const nothing: WeekSum = { onShiftMs: 0, fixedMs: 0 };

/** The week as sums of its rover-shifts. */
@Injectable()
export class WeeklyService {
  /** Sums of weeks, until their rows change: the line of twelve weeks costs no reading of eleven of them. */
  private readonly sums = new Map<string, WeekSum>();

  constructor(
    private readonly figures: ShiftFiguresRepository,
    private readonly lostTime: LostTimeRepository,
    private readonly settings: SettingsService,
    private readonly clock: Clock,
    keeper: FiguresKeeper,
  ) {
    keeper.touched.subscribe((week) => this.sums.delete(week));
  }

  /** ISO week of now in the firm's zone. */
  thisWeek(): string {
    return isoWeekOf(this.clock.now(), this.settings.get().timeZone);
  }

  /** Throws 400 for a week that does not exist, such as 2025-W53. */
  week(week: string, withMoney: boolean, compare?: string): Weekly {
    const { timeZone, currency, firmName, toleranceProfile } = this.settings.get();
    const interval = this.intervalOf(week, '/week');
    const rows = this.figures.ofWeek(week);
    const lost = this.lostTime.between(interval, this.clock.now());
    const weeks = this.weeksTo(week, timeZone, TWELVE);
    const sumOf = this.sumsOf(weeks);
    const sum = sumOf(week);
    const fourBefore = this.add(weeks.slice(TWELVE - FOUR - 1, TWELVE - 1).map(sumOf));
    return {
      week,
      from: interval.start,
      to: interval.end,
      timeZone,
      currency,
      firmName,
      isPart: this.clock.now() < interval.end,
      asOf: this.clock.now(),
      sentence: weekSentence(week, sum, fourBefore, largestOf(lost)),
      total: weekFigures(rows, withMoney),
      fourBefore,
      compared: compare === undefined ? null : { week: compare, total: this.totalOf(compare, withMoney) },
      crews: crewsOf(rows, daysOf(interval, timeZone), withMoney),
      weeks: weeks.map((one) => ({ week: one, ...sumOf(one) })),
      causes: causesOf(lost),
      mountPoints: mountPointsOf(rows, lost),
      rovers: roversOf(rows, lost, withMoney),
      shifts: rows.map((row) => weekShiftOf(row, withMoney)),
      profile: toleranceProfile,
    };
  }

  private totalOf(week: string, withMoney: boolean): WeekFigures {
    this.intervalOf(week, '/compare');
    return weekFigures(this.figures.ofWeek(week), withMoney);
  }

  private intervalOf(week: string, pointer: string): Interval {
    try {
      return isoWeekInterval(week, this.settings.get().timeZone);
    } catch (cause) {
      const detail = (cause as Error).message;
      throw new ProblemException(400, 'invalidBody', `${detail}.`, { cause, errors: [{ pointer, detail }] });
    }
  }

  /** So many weeks, the given one last. */
  private weeksTo(week: string, zone: string, count: number): string[] {
    const monday = DateTime.fromMillis(isoWeekInterval(week, zone).start, { zone });
    return Array.from({ length: count }, (_, index) =>
      isoWeekOf(monday.minus({ weeks: count - 1 - index }).toMillis(), zone),
    );
  }

  private sumsOf(weeks: readonly string[]): (week: string) => WeekSum {
    const unknown = weeks.filter((week) => !this.sums.has(week));
    if (unknown.length > 0) {
      const read = this.figures.sums(unknown);
      for (const week of unknown) this.sums.set(week, read.get(week) ?? nothing);
    }
    return (week) => this.sums.get(week)!;
  }

  private add(sums: readonly WeekSum[]): WeekSum {
    return sums.reduce(
      (total, { onShiftMs, fixedMs }) => ({
        onShiftMs: total.onShiftMs + onShiftMs,
        fixedMs: total.fixedMs + fixedMs,
      }),
      nothing,
    );
  }
}

function grouped<Row, Key>(rows: readonly Row[], keyOf: (row: Row) => Key): Map<Key, Row[]> {
  const groups = new Map<Key, Row[]>();
  for (const row of rows) {
    const key = keyOf(row);
    const group = groups.get(key);
    if (group) group.push(row);
    else groups.set(key, [row]);
  }
  return groups;
}

const lostMsOf = (lost: readonly LostTime[]): number =>
  lost.reduce((sum, { lostMs, cause }) => (cause === 'planned' ? sum : sum + lostMs), 0);

function daysOf({ start, end }: Interval, zone: string): string[] {
  const days: string[] = [];
  for (let day = DateTime.fromMillis(start, { zone }); day.toMillis() < end; day = day.plus({ days: 1 }))
    days.push(day.toISODate()!);
  return days;
}

function crewsOf(
  rows: readonly NamedShiftFigures[],
  days: readonly string[],
  withMoney: boolean,
): Weekly['crews'] {
  return [...grouped(rows, ({ crewId }) => crewId)]
    .map(([crewId, ofCrew]) => ({
      crewId,
      crewName: ofCrew[0]!.crewName,
      figures: weekFigures(ofCrew, withMoney),
      days: days.map((day) => {
        const sum = { day, onShiftMs: 0, fixedMs: 0 };
        for (const row of ofCrew) {
          if (row.day !== day) continue;
          sum.onShiftMs += wholeOf(row);
          sum.fixedMs += row.fixedMs;
        }
        return sum;
      }),
    }))
    .toSorted((a, b) => byName.compare(a.crewName, b.crewName));
}

function causesOf(lost: readonly LostTime[]): WeekCause[] {
  return [...grouped(lost, ({ cause, isConfirmed }) => `${cause} ${isConfirmed}`).values()]
    .map((group) => ({
      cause: group[0]!.cause,
      isConfirmed: group[0]!.isConfirmed,
      lostMs: group.reduce((sum, { lostMs }) => sum + lostMs, 0),
      lostFixes: group.length,
    }))
    .toSorted((a, b) => b.lostMs - a.lostMs);
}

function largestOf(lost: readonly LostTime[]): LostGroup | null {
  const counted = lost.filter(({ cause }) => cause !== 'planned');
  const groups = [...grouped(counted, ({ cause, mountPoint }) => groupKeyOf(cause, mountPoint)).values()].map(
    (group) => ({ cause: group[0]!.cause, mountPoint: group[0]!.mountPoint, lostMs: lostMsOf(group) }),
  );
  return groups.toSorted((a, b) => b.lostMs - a.lostMs)[0] ?? null;
}

function mountPointsOf(rows: readonly NamedShiftFigures[], lost: readonly LostTime[]): Weekly['mountPoints'] {
  const ofLost = grouped(lost, ({ mountPoint }) => mountPoint);
  const ofRows = grouped(rows, ({ mountPoint }) => mountPoint);
  return [...new Set([...ofRows.keys(), ...ofLost.keys()])]
    .map((mountPoint) => {
      const group = ofLost.get(mountPoint) ?? [];
      const worked = ofRows.get(mountPoint) ?? [];
      return {
        mountPoint,
        lostMs: lostMsOf(group),
        lostFixes: group.length,
        onShiftMs: worked.reduce((sum, row) => sum + wholeOf(row), 0),
        fixedMs: worked.reduce((sum, row) => sum + row.fixedMs, 0),
      };
    })
    .toSorted((a, b) => b.lostMs - a.lostMs);
}

function roversOf(
  rows: readonly NamedShiftFigures[],
  lost: readonly LostTime[],
  withMoney: boolean,
): Weekly['rovers'] {
  const ofLost = grouped(lost, ({ roverId }) => roverId);
  return [...grouped(rows, ({ roverId }) => roverId)]
    .map(([roverId, ofRover]) => ({
      roverId,
      roverLabel: ofRover[0]!.roverLabel,
      figures: weekFigures(ofRover, withMoney),
      lostMs: lostMsOf(ofLost.get(roverId) ?? []),
    }))
    .toSorted((a, b) => b.lostMs - a.lostMs);
}
