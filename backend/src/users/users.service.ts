import { Inject, Injectable } from '@nestjs/common';
import type { ChangeUserBody, InvitedUser, InviteUserBody, User } from '@hubtack/contracts/users/user.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { asc, eq, ne } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { PasswordLinksService } from '../auth/password-links.service.js';
import { SessionService } from '../auth/session.service.js';
import { Clock } from '../common/clock.js';
import { conflict, notFound, ProblemException } from '../common/problem.exception.js';
import { uniquely } from '../common/unique.js';
import { DATABASE } from '../database/database.module.js';
import { MailService } from '../mail/mail.service.js';
import { inviteMail } from '../mail/mails.js';
import { SettingsService } from '../settings/settings.service.js';

type UserRow = typeof users.$inferSelect;

const userOf = (row: UserRow): User => ({
  id: row.id,
  name: row.name,
  email: row.email,
  role: row.role,
  crewId: row.crewId,
  status: !row.active ? 'off' : row.passwordHash === null ? 'invited' : 'active',
  lastSignInAt: row.lastSignInAt === null ? null : new Date(row.lastSignInAt).toISOString(),
});
/** Counts as a manager: somebody who was only invited cannot sign in yet, and may never do so. */
const isManager = (row: UserRow): boolean =>
  row.role === 'manager' && row.active && row.passwordHash !== null;
const auditOf = ({ name, email, role, crewId, active }: UserRow) => ({ name, email, role, crewId, active });

@Injectable()
export class UsersService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly links: PasswordLinksService,
    private readonly sessions: SessionService,
    private readonly settings: SettingsService,
    private readonly mail: MailService,
    private readonly audit: AuditService,
    private readonly clock: Clock,
  ) {}

  list(): User[] {
    return this.database.select().from(users).orderBy(asc(users.name)).all().map(userOf);
  }

  async invite(viewer: Viewer, body: InviteUserBody): Promise<InvitedUser> {
    const { name, email, role } = body;
    const crewId = this.crewFor(body);
    const row = this.database.transaction((tx) => {
      const added = uniquely('/email', 'There is an account with this address already.', () =>
        tx.insert(users).values({ name, email, role, crewId, createdAt: this.clock.now() }).returning().get(),
      );
      this.audit.record(viewer, { action: 'user.invited', subject: email, after: auditOf(added) });
      return added;
    });
    return { user: userOf(row), link: await this.sendInvitation(row) };
  }

  async inviteAgain(viewer: Viewer, id: number): Promise<InvitedUser> {
    const row = this.row(id);
    if (row.passwordHash !== null) throw conflict('This person has a password already.');
    if (!row.active) throw conflict('This account is switched off. Switch it on first.');
    this.audit.record(viewer, { action: 'user.invitedAgain', subject: row.email });
    return { user: userOf(row), link: await this.sendInvitation(row) };
  }

  /** Changes count at once: sign-ins of somebody switched off end, others are looked at anew. */
  change(viewer: Viewer, id: number, body: ChangeUserBody): User {
    const crewId = this.crewFor(body);
    const { before, after } = this.database.transaction((tx) => {
      const before = this.row(id);
      if (isManager(before) && (body.role !== 'manager' || !body.active)) this.keepOneManager(id);
      const { name, role, active } = body;
      const after = tx
        .update(users)
        .set({ name, role, crewId, active })
        .where(eq(users.id, id))
        .returning()
        .get();
      this.audit.record(viewer, {
        action: 'user.changed',
        subject: before.email,
        before: auditOf(before),
        after: auditOf(after),
      });
      return { before, after };
    });
    const mayDiffer =
      before.role !== after.role || before.crewId !== after.crewId || before.active !== after.active;
    const open = this.sessions.openOf({ userId: id });
    if (!after.active) this.sessions.end(open, 'accountChanged');
    else if (mayDiffer) this.sessions.lookAnew(open);
    return userOf(after);
  }

  /** Only a crew chief belongs to a crew. */
  private crewFor(body: { role: string; crewId: number | null }): number | null {
    if (body.role !== 'crewChief' || body.crewId === null) return null;
    const crew = this.database.select({ id: crews.id }).from(crews).where(eq(crews.id, body.crewId)).get();
    if (!crew)
      throw new ProblemException(400, 'invalidBody', 'This crew does not exist.', {
        errors: [{ pointer: '/crewId', detail: 'This crew does not exist' }],
      });
    return crew.id;
  }

  private keepOneManager(exceptId: number): void {
    const others = this.database.select().from(users).where(ne(users.id, exceptId)).all();
    if (!others.some(isManager)) throw conflict('This is the last manager. Make another one first.');
  }

  private row(id: number): UserRow {
    const row = this.database.select().from(users).where(eq(users.id, id)).get();
    if (!row) throw notFound('This user');
    return row;
  }

  /** Answers the link when the mail did not go out, so that the manager can hand it over. */
  private async sendInvitation(row: UserRow): Promise<string | null> {
    const link = this.links.make('invite', row.id);
    const sent = await this.mail.send(inviteMail(row, this.settings.get().firmName, link));
    return sent ? null : link;
  }
}
