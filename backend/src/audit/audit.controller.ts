import { Controller, Get, Inject, Query } from '@nestjs/common';
import { ApiOkResponse, ApiTags } from '@nestjs/swagger';
import { auditList, auditQuery, type AuditList } from '@hubtack/contracts/audit/audit-entry.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { auditEntries } from '@hubtack/drizzle/schema/audit-entries.js';
import { desc, lt } from 'drizzle-orm';
import { AllowRoles } from '../auth/access.js';
import { DATABASE } from '../database/database.module.js';

const PAGE = 100;

@ApiTags('audit')
@Controller('audit')
export class AuditController {
  constructor(@Inject(DATABASE) private readonly database: HubtackDatabase) {}

  /** Who changed what, the newest first, a hundred at a time. */
  @Get()
  @AllowRoles()
  @ApiOkResponse({ standardSchema: auditList })
  list(@Query({ schema: auditQuery }) query: { before?: number | undefined }): AuditList {
    const rows = this.database
      .select()
      .from(auditEntries)
      .where(query.before === undefined ? undefined : lt(auditEntries.id, query.before))
      .orderBy(desc(auditEntries.id))
      .limit(PAGE + 1)
      .all();
    const entries = rows.slice(0, PAGE).map(({ id, at, actorName, action, subject, before, after }) => ({
      id,
      at: new Date(at).toISOString(),
      actor: actorName,
      action,
      subject,
      before,
      after,
    }));
    return { entries, nextBefore: rows.length > PAGE ? entries.at(-1)!.id : null };
  }
}
