import { Inject, Injectable } from '@nestjs/common';
import type {
  CorrectionSource,
  CorrectionSourceBody,
} from '@hubtack/contracts/corrections/correction-source.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { notFound } from '../common/problem.exception.js';
import { uniquely } from '../common/unique.js';
import { DATABASE } from '../database/database.module.js';
import { sourceOf, type SourceRow } from './correction-source.view.js';
import { CorrectionSourcesRepository } from './correction-sources.repository.js';
import { CorrectionPasswords } from './passwords.js';

const NAME_TAKEN = 'There is a correction source with this name already.';

/** What of a source decides whether its base is the same, and whether its login is. */
const isSame = (
  a: SourceRow,
  b: CorrectionSourceBody,
  names: readonly (keyof SourceRow & keyof CorrectionSourceBody)[],
) => names.every((name) => a[name] === b[name]);

@Injectable()
export class CorrectionSourcesService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly sources: CorrectionSourcesRepository,
    private readonly passwords: CorrectionPasswords,
    private readonly audit: AuditService,
    private readonly changes: Changes,
  ) {}

  list(): CorrectionSource[] {
    const checks = this.sources.lastChecks();
    return this.sources.list().map((row) => sourceOf(row, checks.get(row.id)));
  }

  get(id: number): CorrectionSource {
    return sourceOf(this.row(id), this.sources.checks(id, 1)[0]);
  }

  row(id: number): SourceRow {
    const row = this.sources.row(id);
    if (!row) throw notFound('This correction source');
    return row;
  }

  add(viewer: Viewer, { password, ...body }: CorrectionSourceBody): CorrectionSource {
    const added = this.database.transaction(() => {
      const { id } = uniquely('/name', NAME_TAKEN, () => this.sources.insert(body));
      const sealedPassword = password ? this.passwords.seal(id, password) : null;
      this.audit.record(viewer, {
        action: 'correctionSource.added',
        subject: body.name,
        after: { ...body, password: password ? 'set' : 'none' },
      });
      return this.sources.update(id, { sealedPassword });
    });
    this.changes.announce({ kind: 'firm' });
    return sourceOf(added, undefined);
  }

  /** A password that is left out stays, unless the address or the port is another: a kept one is not sent to somebody else. */
  change(viewer: Viewer, id: number, { password, ...body }: CorrectionSourceBody): CorrectionSource {
    this.database.transaction(() => {
      const before = this.row(id);
      const goesElsewhere = !isSame(before, body, ['address', 'port']);
      const isKept = password === undefined && !goesElsewhere;
      const sealedPassword = isKept
        ? before.sealedPassword
        : password
          ? this.passwords.seal(id, password)
          : null;
      const isSameBase = !goesElsewhere && before.mountPoint === body.mountPoint;
      const isSameLogin = isSameBase && isKept && before.user === body.user;
      uniquely('/name', NAME_TAKEN, () =>
        this.sources.update(id, {
          ...body,
          sealedPassword,
          ...(isSameLogin ? {} : { refusedAt: null }),
          ...(isSameBase ? {} : FORGOTTEN_BASE),
        }),
      );
      const passwordNow = sealedPassword === null ? 'none' : isKept ? 'kept' : 'set';
      this.audit.record(viewer, {
        action: 'correctionSource.changed',
        subject: before.name,
        before: auditOf(before),
        after: { ...body, password: passwordNow },
      });
    });
    this.changes.announce({ kind: 'firm' });
    return this.get(id);
  }
}

/** What checks have found out, when it is about another base now. */
const FORGOTTEN_BASE = {
  decodedAt: null,
  decodedStationId: null,
  decodedLatitude: null,
  decodedLongitude: null,
  decodedHeightM: null,
  downSince: null,
};

/** Without what is sealed. */
function auditOf(row: SourceRow): Record<string, unknown> {
  const {
    id: _id,
    hasPassword,
    decodedBase: _b,
    lastCheck: _c,
    downSince: _d,
    ...rest
  } = sourceOf(row, undefined);
  return { ...rest, password: hasPassword ? 'set' : 'none' };
}
