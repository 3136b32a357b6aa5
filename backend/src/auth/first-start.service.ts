import { Inject, Injectable, type OnApplicationBootstrap } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { DATABASE } from '../database/database.module.js';
import { PasswordLinksService } from './password-links.service.js';

/** A real installation has no account: its first start prints a one-time link to make the first manager. */
@Injectable()
export class FirstStartService implements OnApplicationBootstrap {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly links: PasswordLinksService,
  ) {}

  onApplicationBootstrap(): void {
    if (this.environment.DEMO || this.environment.NODE_ENV === 'test') return;
    if (this.database.select({ id: users.id }).from(users).limit(1).get()) return;
    // On the console and not in the log: logs are kept and shipped, this link is a key.
    console.log(
      `\nNo account yet. Make the first manager here (works once, for seven days):\n  ${this.links.make('firstManager', null)}\n`,
    );
  }
}
