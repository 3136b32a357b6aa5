import { Inject, Injectable } from '@nestjs/common';
import type {
  ChangeControlPointBody,
  ControlPoint,
  ControlPointBody,
} from '@hubtack/contracts/control-points/control-point.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { controlPoints } from '@hubtack/drizzle/schema/control-points.js';
import { asc, eq } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { notFound } from '../common/problem.exception.js';
import { uniquely } from '../common/unique.js';
import { DATABASE } from '../database/database.module.js';

const NAME_TAKEN = 'There is a control point with this name already.';

@Injectable()
export class ControlPointsService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly audit: AuditService,
  ) {}

  list(): ControlPoint[] {
    return this.database.select().from(controlPoints).orderBy(asc(controlPoints.name)).all();
  }

  add(viewer: Viewer, body: ControlPointBody): ControlPoint {
    return this.database.transaction((tx) => {
      const row = uniquely('/name', NAME_TAKEN, () =>
        tx.insert(controlPoints).values(body).returning().get(),
      );
      this.audit.record(viewer, { action: 'controlPoint.added', subject: row.name, after: body });
      return row;
    });
  }

  change(viewer: Viewer, id: number, body: ChangeControlPointBody): ControlPoint {
    return this.database.transaction((tx) => {
      const before = tx.select().from(controlPoints).where(eq(controlPoints.id, id)).get();
      if (!before) throw notFound('This control point');
      const row = uniquely('/name', NAME_TAKEN, () =>
        tx.update(controlPoints).set(body).where(eq(controlPoints.id, id)).returning().get(),
      );
      this.audit.record(viewer, {
        action: 'controlPoint.changed',
        subject: before.name,
        before,
        after: body,
      });
      return row;
    });
  }
}
