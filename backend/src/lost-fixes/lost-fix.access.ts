import { Injectable } from '@nestjs/common';
import type { Viewer } from '../auth/access.js';
import { notFound } from '../common/problem.exception.js';
import { LostFixRepository } from './lost-fix.repository.js';
import type { LostFixRow } from './lost-fix.view.js';

/** Who may see which lost fix: the office all, a crew chief those of the own crew and the mount point's that one of these hangs under. */
@Injectable()
export class LostFixAccess {
  constructor(private readonly lostFixes: LostFixRepository) {}

  /** The row; 404 for one that is not there or not this viewer's. */
  visible(viewer: Viewer, id: number): LostFixRow {
    const row = this.lostFixes.row(id);
    if (!row || !this.mayOf(viewer, row)) throw notFound('This lost fix');
    return row;
  }

  private mayOf(viewer: Viewer, row: LostFixRow): boolean {
    if (viewer.role !== 'crewChief') return true;
    if (viewer.crewId === null) return false;
    if (row.crewId === viewer.crewId) return true;
    return this.lostFixes.members(row.id).some(({ crewId }) => crewId === viewer.crewId);
  }
}
