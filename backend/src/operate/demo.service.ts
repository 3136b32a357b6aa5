import { writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { Inject, Injectable, Logger, type OnModuleInit } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { roverAssignments, roverKeys, rovers } from '@hubtack/drizzle/schema/rovers.js';
import { sites } from '@hubtack/drizzle/schema/sites.js';
import { users } from '@hubtack/drizzle/schema/users.js';
import { DEMO_PASSWORD } from '@hubtack/drizzle/seeds/demo-accounts.js';
import { seedDemoFirm } from '@hubtack/drizzle/seeds/demo-firm.js';
import { eq } from 'drizzle-orm';
import { PasswordService } from '../auth/password.service.js';
import { hashOfToken, newToken } from '../auth/tokens.js';
import { Clock } from '../common/clock.js';
import { CorrectionPasswords } from '../corrections/passwords.js';
import { DemoPastService } from './demo-past.service.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { DATABASE } from '../database/database.module.js';
import { spansOf } from '../fixes/timeline.js';

/** With DEMO=on an empty database gets the demo firm, and the simulated fleet gets keys for its rovers. */
@Injectable()
export class DemoService implements OnModuleInit {
  private readonly logger = new Logger(DemoService.name);

  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly passwords: PasswordService,
    private readonly sourcePasswords: CorrectionPasswords,
    private readonly past: DemoPastService,
    private readonly clock: Clock,
  ) {}

  async onModuleInit(): Promise<void> {
    if (!this.environment.DEMO) return;
    if (this.database.select({ id: users.id }).from(users).limit(1).get()) return;
    const passwordHash = await this.passwords.hash(DEMO_PASSWORD);
    const began = performance.now();
    seedDemoFirm(this.database, {
      now: this.clock.now(),
      passwordHash,
      casterPort: this.environment.DEMO_CASTER_PORT,
      sealPassword: (sourceId, password) => this.sourcePasswords.seal(sourceId, password),
      toSpans: spansOf,
    });
    this.writeKeys();
    this.past.fill();
    this.logger.log({ seconds: Math.round(performance.now() - began) / 1000 }, 'demo firm seeded');
  }

  /** Keys are shown once, so the fleet's own are put where only the demo's owner can read them. */
  private writeKeys(): void {
    const rows = this.database
      .select({ rover: rovers, source: correctionSources, site: sites })
      .from(rovers)
      .innerJoin(roverAssignments, eq(roverAssignments.roverId, rovers.id))
      .innerJoin(crews, eq(crews.id, roverAssignments.crewId))
      .innerJoin(sites, eq(sites.id, crews.siteId))
      .leftJoin(correctionSources, eq(correctionSources.id, rovers.correctionSourceId))
      .all();
    const keys = rows.map(({ rover, source, site }) => {
      const key = `hub_${newToken()}`;
      this.database
        .insert(roverKeys)
        .values({
          roverId: rover.id,
          keyHash: hashOfToken(key),
          hint: key.slice(0, 9),
          createdAt: this.clock.now(),
        })
        .run();
      const { latitude, longitude } = site;
      return { label: rover.label, key, latitude, longitude, mountPoint: source?.mountPoint ?? null };
    });
    const file = join(dirname(this.environment.DATABASE_FILE), 'demo-rover-keys.json');
    writeFileSync(file, `${JSON.stringify(keys, null, 2)}\n`, { mode: 0o600 });
  }
}
