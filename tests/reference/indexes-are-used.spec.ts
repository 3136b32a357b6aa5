import { makeTestDatabase } from '@hubtack/drizzle/testing/test-database.js';
import { afterAll, beforeAll, expect, it } from 'vitest';

// For each index the query that its comment names, asked of SQLite itself.
const queries: [index: string, sql: string][] = [
  ['sign_in_sessions_user', 'SELECT id FROM sign_in_sessions WHERE user_id = 1 AND ended_at IS NULL'],
  ['refresh_tokens_session', "DELETE FROM refresh_tokens WHERE session_id = 'x'"],
  ['rover_keys_rover', 'SELECT * FROM rover_keys WHERE rover_id = 1 ORDER BY id DESC'],
  ['rover_assignments_rover', 'SELECT * FROM rover_assignments WHERE rover_id = 1 AND start_at <= 5'],
  ['rover_assignments_crew', 'SELECT * FROM rover_assignments WHERE crew_id = 1 AND start_at < 5'],
  ['shifts_crew', 'SELECT * FROM shifts WHERE crew_id = 1 AND start_at < 5'],
  ['shift_pauses_shift', 'SELECT * FROM shift_pauses WHERE shift_id IN (1, 2)'],
  ['lost_fixes_rover', 'SELECT * FROM lost_fixes WHERE rover_id = 1 AND start_at >= 5 AND start_at < 9'],
  ['lost_fixes_crew', 'SELECT * FROM lost_fixes WHERE crew_id = 1 AND start_at < 9'],
  ['lost_fixes_start', 'SELECT * FROM lost_fixes WHERE start_at >= 5 AND start_at < 9'],
  ['shift_figures_week', "SELECT * FROM shift_figures WHERE week = '2026-W49'"],
  ['lost_fixes_mount_point', "SELECT * FROM lost_fixes WHERE mount_point = 'TANF00' AND start_at < 9"],
  ['lost_fixes_shared', 'SELECT * FROM lost_fixes WHERE shared_id = 1'],
  ['lost_fixes_active', 'SELECT * FROM lost_fixes WHERE end_at IS NULL AND closed_at IS NULL'],
  [
    'lost_fix_history_lost_fix',
    "SELECT max(id) FROM lost_fix_history WHERE lost_fix_id = 1 AND kind = 'advice'",
  ],
  ['lost_fix_photos_lost_fix', 'SELECT * FROM lost_fix_photos WHERE lost_fix_id = 1'],
  ['notices_user', 'SELECT * FROM notices WHERE user_id = 1 ORDER BY id DESC LIMIT 50'],
  [
    'outbox_waiting',
    'SELECT * FROM outbox WHERE sent_at IS NULL AND failed_at IS NULL AND next_try_at <= 5 ORDER BY next_try_at',
  ],
  [
    'correction_checks_source',
    'SELECT * FROM correction_checks WHERE source_id = 1 ORDER BY started_at DESC LIMIT 50',
  ],
  ['set_up_cards_rover', 'SELECT * FROM set_up_cards WHERE rover_id = 1 ORDER BY at DESC LIMIT 30'],
  ['check_shots_rover', 'SELECT * FROM check_shots WHERE rover_id = 1 ORDER BY at DESC LIMIT 30'],
  ['check_shots_at', 'SELECT * FROM check_shots WHERE at >= 5 AND at < 9'],
  ['logs_at', 'SELECT * FROM logs ORDER BY at DESC LIMIT 50'],
  ['taps_at', 'DELETE FROM taps WHERE at < 5'],
];
let test: ReturnType<typeof makeTestDatabase>;
beforeAll(() => {
  test = makeTestDatabase();
});
afterAll(() => test.remove());
const plan = (sql: string) =>
  (test.database.$client.prepare(`EXPLAIN QUERY PLAN ${sql}`).all() as { detail: string }[])
    .map(({ detail }) => detail)
    .join('; ');

it.each(queries)('%s', (index, sql) => {
  expect(plan(sql)).toContain(index);
});
it('no index is left out of this list', () => {
  const named = test.database.$client
    .prepare(
      "SELECT name FROM sqlite_master WHERE type = 'index' AND sql IS NOT NULL AND sql NOT LIKE '%UNIQUE%'",
    )
    .pluck()
    .all() as string[];
  expect(named.toSorted()).toEqual(queries.map(([index]) => index).toSorted());
});
it('epochs and spans are searched by key, never scanned', () => {
  const bySlot =
    "SELECT * FROM epochs WHERE slot IN (SELECT value FROM json_each('[1]')) AND rover_id = 1 AND time >= 5";
  expect(plan(bySlot)).toMatch(/SEARCH epochs USING PRIMARY KEY \(slot=\? AND rover_id=\? AND time>\?\)/);
  const window = `SELECT * FROM spans WHERE rover_id = 1 AND start_at <= 9 AND start_at >=
    (SELECT coalesce(max(start_at), 5) FROM spans WHERE rover_id = 1 AND start_at <= 5)`;
  expect(plan(window)).not.toContain('SCAN spans');
});
