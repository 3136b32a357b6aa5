import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { spans } from '@hubtack/drizzle/schema/spans.js';
import { and, eq, sql, type SQL } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';
import type { HeardSpan } from './timeline.js';

/** Stored spans of rovers. Read as a range of one rover's key: the row that covers `from`, and those that follow. */
@Injectable()
export class SpanRepository {
  private readonly insertStatement;
  private readonly endStatement;
  private readonly windowStatement;

  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {
    const { roverId, start, end, state } = spans;
    const place = sql.placeholder;
    this.insertStatement = database
      .insert(spans)
      .values({ roverId: place('roverId'), start: place('start'), end: place('end'), state: place('state') })
      .prepare();
    this.endStatement = database
      .update(spans)
      .set({ end: sql`${place('end')}` })
      .where(and(eq(roverId, place('roverId')), eq(start, place('start'))))
      .prepare();
    const before = sql`(SELECT coalesce(max(${start}), ${place('from')}) FROM ${spans}
      WHERE ${roverId} = ${place('roverId')} AND ${start} <= ${place('from')})`;
    this.windowStatement = database
      .select({ state, start, end })
      .from(spans)
      .where(and(eq(roverId, place('roverId')), sql`${start} >= ${before}`, sql`${start} <= ${place('to')}`))
      .orderBy(start)
      .prepare();
  }

  insert(roverId: number, span: HeardSpan): void {
    this.insertStatement.run({ roverId, ...span });
  }

  setEnd(roverId: number, start: number, end: number): void {
    this.endStatement.run({ roverId, start, end });
  }

  delete(roverId: number, start: number): void {
    this.database
      .delete(spans)
      .where(and(eq(spans.roverId, roverId), eq(spans.start, start)))
      .run();
  }

  /** Spans that overlap or touch [from, to]. */
  window(roverId: number, from: number, to: number): HeardSpan[] {
    return this.windowStatement.all({ roverId, from, to }).filter((span) => span.end >= from);
  }

  first(roverId: number): HeardSpan | undefined {
    return this.outermost(roverId, sql`${spans.start} ASC`);
  }

  last(roverId: number): HeardSpan | undefined {
    return this.outermost(roverId, sql`${spans.start} DESC`);
  }

  private outermost(roverId: number, order: SQL): HeardSpan | undefined {
    return this.database
      .select({ state: spans.state, start: spans.start, end: spans.end })
      .from(spans)
      .where(eq(spans.roverId, roverId))
      .orderBy(order)
      .limit(1)
      .get();
  }
}
