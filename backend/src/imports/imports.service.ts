import { createHash } from 'node:crypto';
import { Inject, Injectable } from '@nestjs/common';
import {
  importColumns,
  type ImportDone,
  type ImportKind,
  type ImportPreview,
} from '@hubtack/contracts/imports/import.js';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { controlPoints } from '@hubtack/drizzle/schema/control-points.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { sites } from '@hubtack/drizzle/schema/sites.js';
import { eq } from 'drizzle-orm';
import { AuditService } from '../audit/audit.service.js';
import type { Viewer } from '../auth/access.js';
import { Changes } from '../common/changes.js';
import { conflict, ProblemException } from '../common/problem.exception.js';
import { DATABASE } from '../database/database.module.js';
import { SettingsService } from '../settings/settings.service.js';
import { ListProblem, readListText, type ListRow } from './list-text.js';
import { planImport, type Existing, type ListShape, type PlannedRow } from './plan.js';
import { controlPointShape, crewShape, siteShape } from './shapes.js';

const refuse = (detail: string, cause?: unknown) =>
  new ProblemException(400, 'invalidBody', detail, { errors: [{ pointer: '/text', detail }], cause });

/** The table of a kind, and the rows to be written to it. */
interface Work {
  rows: PlannedRow<{ name: string }>[];
  write: () => void;
}

@Injectable()
export class ImportsService {
  constructor(
    @Inject(DATABASE) private readonly database: HubtackDatabase,
    private readonly audit: AuditService,
    private readonly changes: Changes,
    private readonly settings: SettingsService,
  ) {}

  /** What a list would do, row by row. Changes nothing. */
  preview(viewer: Viewer, kind: ImportKind, text: string): ImportPreview {
    const { rows } = this.plan(viewer, kind, text);
    return { rows: rows.map(({ write: _, ...row }) => row), fingerprint: fingerprintOf(rows) };
  }

  /** Does what the preview said, all of it or nothing. */
  import(viewer: Viewer, kind: ImportKind, text: string, fingerprint: string): ImportDone {
    const done = this.database.transaction(() => {
      const { rows, write } = this.plan(viewer, kind, text);
      if (fingerprintOf(rows) !== fingerprint)
        throw conflict('Something has changed since this preview. Look at it again: nothing was imported.');
      const wrong = rows.find(({ action }) => action === 'wrong');
      if (wrong) throw refuse(`Row ${wrong.row} is wrong; nothing was imported.`);
      write();
      return {
        added: rows.filter(({ action }) => action === 'add').length,
        changed: rows.filter(({ action }) => action === 'change').length,
      };
    });
    this.changes.announce({ kind: 'firm' });
    return done;
  }

  private plan(viewer: Viewer, kind: ImportKind, text: string): Work {
    const list = readOrRefuse(kind, text);
    if (kind === 'sites') {
      const existing = this.database.select().from(sites).all();
      return this.work(viewer, 'site', siteShape, list, existing, {
        insert: (body) => this.database.insert(sites).values(body).run(),
        update: (id, body) => this.database.update(sites).set(body).where(eq(sites.id, id)).run(),
      });
    }
    if (kind === 'control-points') {
      const existing = this.database.select().from(controlPoints).all();
      return this.work(viewer, 'controlPoint', controlPointShape, list, existing, {
        insert: (body) => this.database.insert(controlPoints).values(body).run(),
        update: (id, body) =>
          this.database.update(controlPoints).set(body).where(eq(controlPoints.id, id)).run(),
      });
    }
    const siteRows = this.database.select({ id: sites.id, name: sites.name }).from(sites).all();
    const shape = crewShape({
      siteNames: new Map(siteRows.map(({ id, name }) => [id, name])),
      maySetRates: viewer.role === 'manager',
      workingWeek: this.settings.get().workingWeek,
    });
    return this.work(viewer, 'crew', shape, list, this.database.select().from(crews).all(), {
      insert: (body) => this.database.insert(crews).values(body).run(),
      update: (id, body) => this.database.update(crews).set(body).where(eq(crews.id, id)).run(),
    });
  }

  private work<Body extends { name: string }>(
    viewer: Viewer,
    subject: string,
    shape: ListShape<Body>,
    list: readonly ListRow[],
    existing: readonly Existing<Body>[],
    table: { insert: (body: Body) => unknown; update: (id: number, body: Body) => unknown },
  ): Work {
    const rows = planImport(shape, list, existing);
    const before = new Map(existing.map((entry) => [entry.id, entry]));
    const write = () => {
      for (const { name, write: planned } of rows) {
        if (!planned) continue;
        const { id, body } = planned;
        if (id === null) table.insert(body);
        else table.update(id, body);
        this.audit.record(viewer, {
          action: `${subject}.${id === null ? 'added' : 'changed'}`,
          subject: name,
          ...(id === null ? {} : { before: before.get(id) }),
          after: body,
        });
      }
    };
    return { rows, write };
  }
}

function readOrRefuse(kind: ImportKind, text: string): ListRow[] {
  try {
    return readListText(text, importColumns[kind]);
  } catch (error) {
    if (error instanceof ListProblem) throw refuse(error.message, error);
    throw error;
  }
}

const fingerprintOf = (rows: readonly PlannedRow<{ name: string }>[]): string =>
  createHash('sha256').update(JSON.stringify(rows)).digest('base64url');
