import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { rovers } from '@hubtack/drizzle/schema/rovers.js';
import { shiftFigures } from '@hubtack/drizzle/schema/shift-figures.js';
import { toleranceSpans } from '@hubtack/drizzle/schema/tolerance-spans.js';
import { and, asc, count, eq, getTableColumns, gt, inArray, lt, max, sql } from 'drizzle-orm';
import type { Interval } from '../common/interval.js';
import { DATABASE } from '../database/database.module.js';

export type ShiftFigureRow = typeof shiftFigures.$inferSelect;

/** A row with the names that belong to it. */
export interface NamedShiftFigures extends ShiftFigureRow {
  crewName: string;
  hourlyRate: number | null;
  roverLabel: string;
}

export interface WeekSum {
  onShiftMs: number;
  fixedMs: number;
}

@Injectable()
export class ShiftFiguresRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  /** The rows of a rover on a local day are as given, and no others. */
  replaceDay(roverId: number, day: string, rows: readonly ShiftFigureRow[]): void {
    this.database
      .delete(shiftFigures)
      .where(and(eq(shiftFigures.roverId, roverId), eq(shiftFigures.day, day)))
      .run();
    for (const row of rows) this.database.insert(shiftFigures).values(row).run();
  }

  count(): number {
    return this.database.select({ count: count() }).from(shiftFigures).get()!.count;
  }

  /** The newest local day with figures of a rover; null without any. */
  lastDay(roverId: number): string | null {
    const row = this.database
      .select({ day: max(shiftFigures.day) })
      .from(shiftFigures)
      .where(eq(shiftFigures.roverId, roverId))
      .get();
    return row?.day ?? null;
  }

  ofWeek(week: string): NamedShiftFigures[] {
    return this.database
      .select({
        ...getTableColumns(shiftFigures),
        crewName: crews.name,
        hourlyRate: crews.hourlyRate,
        roverLabel: rovers.label,
      })
      .from(shiftFigures)
      .innerJoin(crews, eq(crews.id, shiftFigures.crewId))
      .innerJoin(rovers, eq(rovers.id, shiftFigures.roverId))
      .where(eq(shiftFigures.week, week))
      .orderBy(asc(shiftFigures.day), asc(crews.name), asc(rovers.label), asc(shiftFigures.startAt))
      .all();
  }

  sums(weeks: readonly string[]): Map<string, WeekSum> {
    const { fixedMs, floatMs, codeMs, noneMs, silentMs } = shiftFigures;
    const rows = this.database
      .select({
        week: shiftFigures.week,
        onShiftMs: sql<number>`sum(${fixedMs} + ${floatMs} + ${codeMs} + ${noneMs} + ${silentMs})`,
        fixedMs: sql<number>`sum(${fixedMs})`,
      })
      .from(shiftFigures)
      .where(inArray(shiftFigures.week, [...weeks]))
      .groupBy(shiftFigures.week)
      .all();
    return new Map(rows.map(({ week, ...sum }) => [week, sum]));
  }

  /** Runs within the tolerance profile that overlap the window. */
  withinSpans(roverId: number, window: Interval): Interval[] {
    return this.database
      .select({ start: toleranceSpans.start, end: toleranceSpans.end })
      .from(toleranceSpans)
      .where(
        and(
          eq(toleranceSpans.roverId, roverId),
          lt(toleranceSpans.start, window.end),
          // A run lasts no longer than a day or so; the key is (rover, start).
          gt(toleranceSpans.start, window.start - LONGEST_RUN_MS),
          gt(toleranceSpans.end, window.start),
        ),
      )
      .orderBy(asc(toleranceSpans.start))
      .all();
  }

  /** What the spans say over the window is as given; runs that touch become one, cut at LONGEST_RUN_MS. */
  replaceWithin(roverId: number, window: Interval, spans: readonly Interval[]): void {
    const touched = this.withinSpans(roverId, { start: window.start - 1, end: window.end + 1 });
    const kept = touched.flatMap(({ start, end }) => [
      ...(start < window.start ? [{ start, end: Math.min(end, window.start) }] : []),
      ...(end > window.end ? [{ start: Math.max(start, window.end), end }] : []),
    ]);
    for (const { start } of touched)
      this.database
        .delete(toleranceSpans)
        .where(and(eq(toleranceSpans.roverId, roverId), eq(toleranceSpans.start, start)))
        .run();
    for (const span of joined([...kept, ...spans]))
      this.database
        .insert(toleranceSpans)
        .values({ roverId, ...span })
        .run();
  }
}

const LONGEST_RUN_MS = 86_400_000;

function joined(spans: readonly Interval[]): Interval[] {
  const result: Interval[] = [];
  for (const { start, end } of spans.toSorted((a, b) => a.start - b.start)) {
    const last = result.at(-1);
    if (last && last.end >= start && Math.max(end, last.end) - last.start < LONGEST_RUN_MS)
      last.end = Math.max(last.end, end);
    else result.push({ start, end });
  }
  return result;
}
