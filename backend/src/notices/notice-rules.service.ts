import { Inject, Injectable } from '@nestjs/common';
import type { Role } from '@hubtack/contracts/auth/role.js';
import { defaultNoticeRules, type NoticeRule } from '@hubtack/contracts/notices/notice.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { noticeRuleOwners, noticeRules } from '@hubtack/drizzle/schema/notices.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { and, eq, isNotNull } from 'drizzle-orm';
import { Subject } from 'rxjs';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { notFound } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import type { PolicyPerson } from './notice-tellings.js';

export interface NoticePerson extends PolicyPerson {
  email: string;
}
type Person = Pick<typeof users.$inferSelect, 'id' | 'role' | 'email'>;

/** What each person wants to be told: own rules, or those of the role. */
@Injectable()
export class NoticeRulesService {
  private readonly changes = new Subject<void>();
  /** Somebody's rules are others now. */
  readonly changed = this.changes.asObservable();

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly audit: AuditService,
  ) {}

  rules(userId: number): NoticeRule[] {
    const { id, role } = this.person(userId);
    return this.rulesOf(id, role);
  }

  set(viewer: Viewer, userId: number, rules: NoticeRule[]): NoticeRule[] {
    return this.change(viewer, userId, (person) => {
      this.database.insert(noticeRuleOwners).values({ userId: person.id }).onConflictDoNothing().run();
      this.database.delete(noticeRules).where(eq(noticeRules.userId, person.id)).run();
      if (rules.length === 0) return;
      this.database
        .insert(noticeRules)
        .values(rules.map((rule) => ({ userId: person.id, ...rule })))
        .run();
    });
  }

  /** Back to what the role is told. */
  reset(viewer: Viewer, userId: number): NoticeRule[] {
    return this.change(viewer, userId, (person) => {
      this.database.delete(noticeRules).where(eq(noticeRules.userId, person.id)).run();
      this.database.delete(noticeRuleOwners).where(eq(noticeRuleOwners.userId, person.id)).run();
    });
  }

  /** Everybody who can sign in. Who was only invited, or is switched off, is told nothing. */
  people(): NoticePerson[] {
    return this.database
      .select({ userId: users.id, role: users.role, crewId: users.crewId, email: users.email })
      .from(users)
      .where(and(eq(users.active, true), isNotNull(users.passwordHash)))
      .all()
      .map((person) => ({ ...person, rules: this.rulesOf(person.userId, person.role) }));
  }

  private change(viewer: Viewer, userId: number, write: (person: Person) => void): NoticeRule[] {
    const after = this.database.transaction(() => {
      const person = this.person(userId);
      const before = this.rulesOf(person.id, person.role);
      write(person);
      const after = this.rulesOf(person.id, person.role);
      if (viewer.userId !== userId)
        this.audit.record(viewer, {
          action: 'noticeRules.changed',
          subject: person.email,
          before: { rules: before },
          after: { rules: after },
        });
      return after;
    });
    this.changes.next();
    return after;
  }

  private rulesOf(userId: number, role: Role): NoticeRule[] {
    const hasOwn = this.database
      .select()
      .from(noticeRuleOwners)
      .where(eq(noticeRuleOwners.userId, userId))
      .get();
    if (!hasOwn) return defaultNoticeRules[role];
    const { subject, way, afterMinutes } = noticeRules;
    return this.database
      .select({ subject, way, afterMinutes })
      .from(noticeRules)
      .where(eq(noticeRules.userId, userId))
      .all();
  }

  private person(userId: number): Person {
    const { id, role, email } = users;
    const person = this.database.select({ id, role, email }).from(users).where(eq(users.id, userId)).get();
    if (!person) throw notFound('This user');
    return person;
  }
}
