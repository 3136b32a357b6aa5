import { Inject, Injectable, Logger } from '@nestjs/common';
import { JwtService } from '@nestjs/jwt';
import type {
  FirstManagerBody,
  LinkInfo,
  Me,
  PasswordBody,
  SignInBody,
} from '@hubtack/contracts/auth/sign-in.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { eq } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import { Clock } from '../common/clock.js';
import { conflict, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import { MailService } from '../mail/mail.service.js';
import { resetMail } from '../mail/mails.js';
import { SettingsService } from '../settings/settings.service.js';
import type { Viewer } from './access.js';
import { ACCESS_CHECKS, type AccessClaims } from './jwt.strategy.js';
import { PasswordLinksService } from './password-links.service.js';
import { PasswordService } from './password.service.js';
import { SessionService, type IssuedSession } from './session.service.js';

export interface SignedIn extends IssuedSession {
  accessToken: string;
}

@Injectable()
export class AuthService {
  private readonly logger = new Logger(AuthService.name);

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly jwt: JwtService,
    private readonly passwords: PasswordService,
    private readonly sessions: SessionService,
    private readonly links: PasswordLinksService,
    private readonly settings: SettingsService,
    private readonly mail: MailService,
    private readonly audit: AuditService,
    private readonly clock: Clock,
  ) {}

  async signIn(body: SignInBody): Promise<SignedIn> {
    const checked = this.userOf(body.email)?.passwordHash ?? null;
    const matches = await this.passwords.verify(checked, body.password);
    // Read again: the password may have been reset, or the account switched off, while the check was running.
    const user = this.userOf(body.email);
    if (!matches || !user?.active || user.passwordHash !== checked)
      throw new ProblemException(401, 'wrongSignIn', 'E-mail address or password is wrong.');
    this.database.update(users).set({ lastSignInAt: this.clock.now() }).where(eq(users.id, user.id)).run();
    return this.withAccess(this.sessions.start({ userId: user.id }));
  }

  refresh(token: string): SignedIn {
    return this.withAccess(this.sessions.refresh(token));
  }

  withAccess(session: IssuedSession): SignedIn {
    const claims: AccessClaims = { sid: session.sessionId };
    return { ...session, accessToken: this.jwt.sign(claims) };
  }

  /** Ends the sign-in of whichever cookie still tells which it is. */
  signOut(tokens: { access: string | null; refresh: string | null }): void {
    const ids = [
      tokens.refresh === null ? null : this.sessions.idOf(tokens.refresh),
      tokens.access === null ? null : this.idOfAccess(tokens.access),
    ].filter((id) => id !== null);
    this.sessions.end([...new Set(ids)], 'signOut');
  }

  me(viewer: Viewer): Me {
    const { firmName, timeZone, units } = this.settings.get();
    const { userId, name, role, crewId } = viewer;
    const email =
      userId === null
        ? null
        : (this.database.select({ email: users.email }).from(users).where(eq(users.id, userId)).get()
            ?.email ?? null);
    return { userId, name, email, role, crewId, firmName, timeZone, units };
  }

  /**
   * Mails a reset link when there is such an account. Nobody is told whether there is, not by the time it takes
   * either: everything is done after the answer.
   */
  forgot(email: string): void {
    setImmediate(() => {
      this.mailResetLink(email).catch((error: unknown) => {
        this.logger.error({ err: error }, 'no reset link was made');
      });
    });
  }

  link(token: string): LinkInfo {
    const { purpose, userId } = this.links.find(token);
    const user =
      userId === null ? undefined : this.database.select().from(users).where(eq(users.id, userId)).get();
    return { purpose, email: user?.email ?? null };
  }

  /** Sets the password of an invitation or a reset, ends all other sign-ins of the person, and signs in. */
  async setPassword(body: PasswordBody): Promise<SignedIn> {
    // Once before the costly part, and again after it: another request may have used the link meanwhile.
    this.links.find(body.token);
    const passwordHash = await this.passwords.hash(body.password);
    const link = this.links.find(body.token);
    const { userId } = link;
    if (userId === null)
      throw new ProblemException(410, 'linkInvalid', 'This link is for the first manager.');
    const others = this.sessions.openOf({ userId });
    this.database.transaction((tx) => {
      const user = tx.select().from(users).where(eq(users.id, userId)).get();
      if (!user?.active)
        throw new ProblemException(410, 'linkInvalid', 'This account has been switched off.');
      tx.update(users)
        .set({ passwordHash, lastSignInAt: this.clock.now() })
        .where(eq(users.id, userId))
        .run();
      this.links.markUsed(link);
      this.audit.record(
        { userId: user.id, name: user.name },
        {
          action: 'user.passwordSet',
          subject: user.email,
          after: { by: link.purpose },
        },
      );
    });
    this.sessions.end(others, 'accountChanged');
    return this.withAccess(this.sessions.start({ userId }));
  }

  /** The first start prints a link; whoever has it becomes the first manager. */
  async makeFirstManager(body: FirstManagerBody): Promise<SignedIn> {
    this.links.find(body.token);
    const passwordHash = await this.passwords.hash(body.password);
    const link = this.links.find(body.token);
    if (link.purpose !== 'firstManager')
      throw new ProblemException(410, 'linkInvalid', 'This link is not for the first manager.');
    const userId = this.database.transaction((tx) => {
      if (tx.select({ id: users.id }).from(users).limit(1).get())
        throw conflict('There is a manager already. Ask for an invitation.');
      const user = tx
        .insert(users)
        .values({
          name: body.name,
          email: body.email,
          passwordHash,
          role: 'manager',
          createdAt: this.clock.now(),
        })
        .returning()
        .get();
      this.links.markUsed(link);
      this.audit.record(
        { userId: user.id, name: user.name },
        { action: 'user.firstManager', subject: user.email },
      );
      return user.id;
    });
    return this.withAccess(this.sessions.start({ userId }));
  }

  private async mailResetLink(email: string): Promise<void> {
    const user = this.userOf(email);
    if (user?.active) await this.mail.send(resetMail(user, this.links.make('reset', user.id)));
  }

  private idOfAccess(token: string): string | null {
    try {
      return this.jwt.verify<AccessClaims>(token, ACCESS_CHECKS).sid;
    } catch {
      // Run out or not ours: it tells nothing.
      return null;
    }
  }

  private userOf(email: string) {
    return this.database.select().from(users).where(eq(users.email, email)).get();
  }
}
