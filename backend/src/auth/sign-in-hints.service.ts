import { Inject, Injectable } from '@nestjs/common';
import { roleNames } from '@hubtack/contracts/auth/role.js';
import type { SignInHints } from '@hubtack/contracts/auth/sign-in.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { DEMO_MAIL_DOMAIN, DEMO_PASSWORD } from '@hubtack/drizzle/seeds/demo-accounts.js';
import { asc, like } from 'drizzle-orm';
import { DATABASE } from '../database/database.module.js';

@Injectable()
export class SignInHintsService {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  list(): SignInHints {
    const accounts = this.database
      .select({ email: users.email, role: users.role })
      .from(users)
      .where(like(users.email, `%@${DEMO_MAIL_DOMAIN}`))
      .orderBy(asc(users.id))
      .all();
    return {
      accounts: accounts.map(({ email, role }) => ({ email, role: roleNames[role] })),
      password: DEMO_PASSWORD,
    };
  }
}
