import { Inject, Injectable } from '@nestjs/common';
import type { HubtackDatabase } from '@hubtack/drizzle/database.js';
import { DATABASE } from '../database/database.module.js';

export interface ToDo {
  roverId: number;
  start: number;
  end: number;
}

/** Stretches of the past whose figures are to be worked out again. Written in the transaction that changes the past. */
@Injectable()
export class FiguresToDo {
  private readonly insert;
  private readonly select;
  private readonly remove;

  constructor(@Inject(DATABASE) database: HubtackDatabase) {
    const client = database.$client;
    this.insert = client.prepare(
      `INSERT INTO figures_to_do (rover_id, start_at, end_at) VALUES (?, ?, ?)
       ON CONFLICT DO UPDATE SET end_at = max(end_at, excluded.end_at)`,
    );
    this.select = client.prepare(
      'SELECT rover_id AS roverId, start_at AS start, end_at AS end FROM figures_to_do LIMIT ?',
    );
    this.remove = client.prepare(
      'DELETE FROM figures_to_do WHERE rover_id = ? AND start_at = ? AND end_at = ?',
    );
  }

  add({ roverId, start, end }: ToDo): void {
    this.insert.run(roverId, start, end);
  }

  some(limit: number): ToDo[] {
    return this.select.all(limit) as ToDo[];
  }

  /** Done, unless it has grown meanwhile. */
  done({ roverId, start, end }: ToDo): void {
    this.remove.run(roverId, start, end);
  }
}
