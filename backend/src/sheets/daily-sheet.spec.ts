import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { noTotals } from '@hubtack/contracts/fixes/totals.js';
import { expect, it } from 'vitest';
import { dailyMail, type CrewDayFacts } from './daily-sheet.js';

const HOUR = 3_600_000;
const at = (time: string): number => Date.parse(`2026-10-05T${time}+11:00`);

const lostFix = (change: Partial<LostFix>): LostFix => ({
  id: 1,
  kind: 'lostFix',
  status: 'ended',
  roverId: 1,
  roverLabel: 'R-04',
  crewId: 1,
  crewName: 'Dogwood',
  crewPhone: null,
  siteName: null,
  mountPoint: 'TANF00',
  startAt: at('09:40:00'),
  raisedAt: at('09:40:30'),
  endAt: at('09:52:00'),
  ending: 'regained',
  pausedMs: 0,
  sharedId: null,
  members: 0,
  flag: null,
  taken: null,
  advice: null,
  shelved: null,
  diagnosis: { cause: 'skyBlocked', evidence: [], runnerUp: null, at: at('09:45:00') },
  diagnosisAtRaising: null,
  isChattering: false,
  photos: 0,
  closed: null,
  ...change,
});
const facts = (change: Partial<CrewDayFacts> = {}): CrewDayFacts => ({
  firmName: 'Pennywort Surveys',
  crewName: 'Dogwood',
  day: '2026-10-05',
  timeZone: 'Australia/Hobart',
  shifts: [{ start: at('07:05:00'), end: at('15:30:00') }],
  rovers: [{ label: 'R-04', totals: { ...noTotals(), fixedMs: 6 * HOUR, floatMs: 2 * HOUR } }],
  lostFixes: [],
  waitingFromBefore: [],
  ...change,
});
const mailOf = (change: Partial<CrewDayFacts> = {}) =>
  dailyMail(facts(change), 'https://board.pennywort.example');

it('says the day’s time on shift and how much of it had a fix', () => {
  const { subject, text, html } = mailOf();
  expect(subject).toBe('Dogwood, Monday 5 October 2026: 75.0 % fix uptime');
  expect(text).toContain('Dogwood: 75.0 % fix uptime in 8 h 0 min on shift; nothing was lost.');
  expect(text).toContain('Shift: 07:05 to 15:30');
  expect(text).toContain('R-04: 75.0 %\n  fixed 75.0 %, float 25.0 %');
  expect(text).not.toContain('Waiting');
  expect(html).toContain('07:05 to 15:30');
});

it('tells each lost fix with its likely cause and the first thing to try', () => {
  const { text } = mailOf({ lostFixes: [lostFix({})] });
  expect(text).toContain(
    '09:40 Lost fix, R-04: 12 min 0 s, fix regained. Sky blocked? Nobody has confirmed it. First thing to try: Move into the open',
  );
});

it('advice that was given, a confirmed cause and the crew’s own word stand instead', () => {
  const advised = lostFix({
    flag: { at: at('09:41:00'), word: 'underCover', note: null, by: 'Chief' },
    advice: { at: at('09:43:00'), by: 'Dispatcher', text: 'Use the offset\nfrom H3' },
  });
  const closed = lostFix({
    status: 'closed',
    closed: { at: at('14:00:00'), by: 'Dispatcher', cause: 'equipment', note: null },
  });
  const { text } = mailOf({ lostFixes: [advised, closed] });
  expect(text).toContain('The crew said: under cover. Advice by Dispatcher: Use the offset from H3');
  expect(text).toContain('Equipment, confirmed.');
  expect(text.match(/First thing to try/g)).toBeNull();
});

it('what nobody has closed is listed, that of earlier days first; what is closed is not', () => {
  const before = lostFix({ startAt: at('09:00:00') - 72 * HOUR, kind: 'notHeard', roverLabel: 'R-02' });
  const closed = lostFix({
    status: 'closed',
    startAt: at('11:11:00'),
    closed: { at: at('14:00:00'), by: 'Dispatcher', cause: 'skyBlocked', note: null },
  });
  const { text } = mailOf({ lostFixes: [lostFix({}), closed], waitingFromBefore: [before] });
  const waiting = text.slice(text.indexOf('Waiting to be closed'));
  // Three days of 24 h before is an hour earlier on the clock: it went forward meanwhile.
  expect(waiting).toMatch(/2 Oct 08:00: Not heard, R-02\n5 Oct 09:40: Lost fix, R-04\n/);
  expect(waiting).not.toContain('11:11');
});

it('one that is still open has no length', () => {
  expect(mailOf({ lostFixes: [lostFix({ endAt: null, ending: null })] }).text).toContain('Still open.');
});

it('a day without a rover has no figures', () => {
  const { subject, text } = mailOf({ rovers: [] });
  expect(subject).toContain('no rover was on shift');
  expect(text).toContain('Fix uptime: no data');
  expect(text).not.toMatch(/\d %/);
});

it('what people wrote is escaped in HTML', () => {
  const advice = { at: 1, by: 'A & B', text: '<img src=x onerror=y>' };
  const { html } = mailOf({ lostFixes: [lostFix({ advice })] });
  expect(html).toContain('Advice by A &amp; B: &lt;img src=x onerror=y&gt;');
});
