import { Inject, Injectable } from '@nestjs/common';
import type {
  CorrectionSource,
  CorrectionSourceBody,
} from '@hubtack/contracts/corrections/correction-source.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';
import { asc, eq } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { notFound } from '../common/problem.exception.js';
import { uniquely } from '../common/unique.js';
import { DATABASE } from '../database/database.module.js';

const withoutPassword = ({ password: _password, ...body }: CorrectionSourceBody) => body;

const viewOf = (row: typeof correctionSources.$inferSelect): CorrectionSource => ({
  id: row.id,
  name: row.name,
  address: row.address,
  port: row.port,
  mountPoint: row.mountPoint,
  user: row.user,
  ntripVersion: row.ntripVersion,
  tls: row.tls,
  sendPosition: row.sendPosition,
  expectedFormat: row.expectedFormat,
  watchMinutes: row.watchMinutes,
  baseLatitude: row.baseLatitude,
  baseLongitude: row.baseLongitude,
  hasPassword: row.sealedPassword !== null,
  decodedBase: null,
  lastCheck: null,
  downSince: null,
});

const NAME_TAKEN = 'There is a correction source with this name already.';

@Injectable()
export class CorrectionSourcesService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly audit: AuditService,
    private readonly changes: Changes,
  ) {}

  list(): CorrectionSource[] {
    return this.database
      .select()
      .from(correctionSources)
      .orderBy(asc(correctionSources.name))
      .all()
      .map((row) => viewOf(row));
  }

  add(viewer: Viewer, body: CorrectionSourceBody): CorrectionSource {
    const added = this.database.transaction((tx) => {
      const row = uniquely('/name', NAME_TAKEN, () =>
        viewOf(tx.insert(correctionSources).values(withoutPassword(body)).returning().get()),
      );
      this.audit.record(viewer, {
        action: 'correctionSource.added',
        subject: row.name,
        after: withoutPassword(body),
      });
      return row;
    });
    this.changes.announce({ kind: 'firm' });
    return added;
  }

  change(viewer: Viewer, id: number, body: CorrectionSourceBody): CorrectionSource {
    const changed = this.database.transaction((tx) => {
      const before = tx.select().from(correctionSources).where(eq(correctionSources.id, id)).get();
      if (!before) throw notFound('This correction source');
      const row = uniquely('/name', NAME_TAKEN, () =>
        viewOf(
          tx
            .update(correctionSources)
            .set(withoutPassword(body))
            .where(eq(correctionSources.id, id))
            .returning()
            .get(),
        ),
      );
      this.audit.record(viewer, {
        action: 'correctionSource.changed',
        subject: before.name,
        before,
        after: withoutPassword(body),
      });
      return row;
    });
    this.changes.announce({ kind: 'firm' });
    return changed;
  }
}
