import { Inject, Injectable } from '@nestjs/common';
import type { Holiday } from '@hubtack/contracts/settings/holidays.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { holidays } from '@hubtack/drizzle/schema/holidays.js';
import { asc } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { DATABASE } from '../database/database.module.js';

/** Local days on which no pattern counts. */
@Injectable()
export class HolidaysService {
  private known: ReadonlySet<string> | null = null;

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly audit: AuditService,
    private readonly changes: Changes,
  ) {}

  list(): Holiday[] {
    return this.database.select().from(holidays).orderBy(asc(holidays.day)).all();
  }

  /** Local days, YYYY-MM-DD. */
  days(): ReadonlySet<string> {
    this.known ??= new Set(this.list().map(({ day }) => day));
    return this.known;
  }

  replace(viewer: Viewer, list: readonly Holiday[]): Holiday[] {
    const before = this.list();
    this.database.transaction((tx) => {
      tx.delete(holidays).run();
      for (const one of list) tx.insert(holidays).values(one).run();
      this.audit.record(viewer, {
        action: 'holidays.changed',
        subject: 'Holidays',
        before: { holidays: before },
        after: { holidays: list },
      });
    });
    this.known = null;
    const kept = new Set(list.map(({ day }) => day));
    const were = new Set(before.map(({ day }) => day));
    const days = [...before, ...list].map(({ day }) => day).filter((day) => kept.has(day) !== were.has(day));
    this.changes.announce({ kind: 'holidays', days: [...new Set(days)] });
    this.changes.announce({ kind: 'firm' });
    return this.list();
  }
}
