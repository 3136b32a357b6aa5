import { Inject, Injectable } from '@nestjs/common';
import type { Role } from '@hubtack/contracts/auth/role.js';
import { sheetsOfRole, type SheetKind } from '@hubtack/contracts/sheets/subscription.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { outbox } from '@hubtack/drizzle/schema/outbox.js';
import { subscriptions } from '@hubtack/drizzle/schema/subscriptions.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { and, asc, eq, isNotNull } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';

export interface Subscriber {
  userId: number;
  email: string;
  role: Role;
  crewId: number | null;
}

@Injectable()
export class SubscriptionRepository {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  sheetsOf(userId: number): SheetKind[] {
    return this.database
      .select({ sheet: subscriptions.sheet })
      .from(subscriptions)
      .where(eq(subscriptions.userId, userId))
      .all()
      .map(({ sheet }) => sheet);
  }

  replace(userId: number, sheets: ReadonlySet<SheetKind>): void {
    this.database.transaction((tx) => {
      tx.delete(subscriptions).where(eq(subscriptions.userId, userId)).run();
      for (const sheet of sheets) tx.insert(subscriptions).values({ userId, sheet }).run();
    });
  }

  /** Who wants a sheet, can sign in, and still has a role that may have it. */
  subscribers(sheet: SheetKind): Subscriber[] {
    const { id: userId, email, role, crewId } = users;
    return this.database
      .select({ userId, email, role, crewId })
      .from(subscriptions)
      .innerJoin(users, eq(users.id, subscriptions.userId))
      .where(and(eq(subscriptions.sheet, sheet), eq(users.active, true), isNotNull(users.passwordHash)))
      .orderBy(asc(users.id))
      .all()
      .filter((person) => sheetsOfRole[person.role].includes(sheet));
  }

  /** Whether a mail for this reason has been put into the outbox, sent or not. */
  isPut(reason: string): boolean {
    return (
      this.database.select({ id: outbox.id }).from(outbox).where(eq(outbox.reason, reason)).get() !==
      undefined
    );
  }
}
