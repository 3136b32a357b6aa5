import BetterSqlite3 from 'better-sqlite3';

/** What every floor stores, and how: same key, same durability as ours, one prepared insert, commit what has queued. */
export interface FloorRow {
  rover: number;
  time: number;
  quality: number;
  satellites: number | null;
  hdop: number | null;
  ageMs: number | null;
  station: number | null;
  latitude: number | null;
  longitude: number | null;
  altitude: number | null;
  separation: number | null;
}

const SLOT_MS = 30_000;

export class FloorStore {
  stored = 0;
  private readonly database;
  private readonly insert;
  private waiting: { rows: FloorRow[]; done: () => void }[] = [];
  private scheduled = false;

  constructor(file: string) {
    this.database = new BetterSqlite3(file);
    this.database.pragma('journal_mode = WAL');
    this.database.pragma('synchronous = FULL');
    this.database.pragma('wal_autocheckpoint = 10000');
    this.database
      .exec(`CREATE TABLE epochs (slot INTEGER, rover INTEGER, time INTEGER, quality INTEGER NOT NULL,
      satellites INTEGER, hdop REAL, age INTEGER, station INTEGER, latitude REAL, longitude REAL, altitude REAL,
      separation REAL, PRIMARY KEY (slot, rover, time)) WITHOUT ROWID`);
    this.insert = this.database.prepare(
      'INSERT INTO epochs VALUES (?,?,?,?,?,?,?,?,?,?,?,?) ON CONFLICT DO NOTHING',
    );
  }

  add(rows: FloorRow[], done: () => void): void {
    this.waiting.push({ rows, done });
    if (this.scheduled) return;
    this.scheduled = true;
    setImmediate(() => this.commit());
  }

  private commit(): void {
    this.scheduled = false;
    const group = this.waiting;
    this.waiting = [];
    this.database.exec('BEGIN IMMEDIATE');
    for (const { rows } of group) {
      for (const row of rows) {
        this.insert.run(
          Math.floor(row.time / SLOT_MS),
          row.rover,
          row.time,
          row.quality,
          row.satellites,
          row.hdop,
          row.ageMs,
          row.station,
          row.latitude,
          row.longitude,
          row.altitude,
          row.separation,
        );
      }
      this.stored += rows.length;
    }
    this.database.exec('COMMIT');
    for (const { done } of group) done();
  }
}
