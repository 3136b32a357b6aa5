import { expect, it } from 'vitest';
import { makeWeekly, type TestShift } from './testing/make-weekly.js';
import { weeklyMail } from './weekly-mail.js';

const HOUR = 3_600_000;
const options = { boardUrl: 'https://board.pennywort.example', withMoney: true };
const shifts: TestShift[] = [
  {
    crewName: 'Alder',
    totals: { fixedMs: 5 * HOUR + 1001, floatMs: HOUR, silentMs: 999 },
    lostFixes: 2,
    regains: [61_000, 120_000],
  },
  { crewName: 'Dogwood', totals: { fixedMs: 3 * HOUR, codeMs: 2 * HOUR + 17, noneMs: 60_000 } },
];
const causes = [
  { cause: 'skyBlocked', isConfirmed: true, lostMs: 5_400_000, lostFixes: 3 },
  { cause: 'wentQuiet', isConfirmed: false, lostMs: 1_200_000, lostFixes: 1 },
] as const;
const mountPoints = [
  { mountPoint: 'TANF00', lostMs: 5_400_000, lostFixes: 3, onShiftMs: 8 * HOUR, fixedMs: 6 * HOUR },
];

/** What a reader of the HTML part sees: words in order, tags and escapes gone. */
const seenIn = (html: string): string =>
  html
    .replace(/<head>.*<\/head>/s, '')
    .replaceAll(/<[^>]+>/g, ' ')
    .replaceAll('&nbsp;', ' ')
    .replaceAll('&#39;', "'")
    .replaceAll('&quot;', '"')
    .replaceAll('&lt;', '<')
    .replaceAll('&gt;', '>')
    .replaceAll('&amp;', '&');
const numbersOf = (text: string): string[] => text.match(/\d+(?:[.:,]\d+)*/g) ?? [];
const sorted = (list: string[]): string[] => list.toSorted();

it('says the week, its figures, crews, causes, cautions and where the page is', () => {
  const { subject, text } = weeklyMail(makeWeekly(shifts, { causes: [...causes], mountPoints }), options);
  expect(subject).toBe('Week 40: 72.6 % fix uptime - Pennywort Surveys');
  expect(text).toContain('28 Sep to 4 Oct 2026');
  expect(text).toContain('Week 40: as the page says it.');
  expect(text).toContain('Fix uptime: 72.6 % (8 h 0 min of 11 h 1 min on shift)');
  expect(text).toContain('Four weeks before: 90.0 %');
  expect(text).toContain('Time to regain: mean 1 min 31 s, 90th percentile (type 7) 1 min 54 s, 2 ended');
  expect(text).toContain('Paid time without a fix: 3 h 1 min');
  expect(text).toContain('Its cost: AUD 362.03');
  expect(text).toMatch(
    /Dogwood: 59\.8 %\n {2}fixed 59\.8 %, float 0\.0 %, code only 39\.9 %, no position 0\.3 %, quiet 0\.0 %/,
  );
  expect(text).toMatch(/confirmed by a person\n-+\n\nSky blocked: 1 h 30 min\n {2}3 lost fixes/);
  expect(text).toMatch(/confirmed by nobody\n-+\n\nNothing heard from the rover: 20 min/);
  expect(text).toContain('TANF00: 1 h 30 min in 3 lost fixes; fix uptime 75.0 %');
  expect(text).toContain('not all of it was lost work');
  expect(text).toContain('fixed is the receiver’s own claim');
  expect(text).toContain('https://board.pennywort.example/weekly?week=2026-W40');
});

it('the least fix uptime stands first', () => {
  const { text } = weeklyMail(makeWeekly(shifts), options);
  expect(text.indexOf('Dogwood: ')).toBeLessThan(text.indexOf('Alder: '));
});

it('both parts carry the same numbers', () => {
  const weekly = makeWeekly(shifts, { causes: [...causes], mountPoints });
  const { text, html } = weeklyMail(weekly, options);
  const link = `${options.boardUrl}/weekly?week=2026-W40`;
  expect(html).toContain(`href="${link}"`);
  const inText = numbersOf(text.replace(link, ''));
  expect(inText.length).toBeGreaterThan(60);
  expect(sorted(numbersOf(seenIn(html)))).toEqual(sorted(inText));
});

it.each(['text', 'html'] as const)('states add up exactly in the %s part', (part) => {
  const mail = weeklyMail(makeWeekly(shifts), options);
  const text = part === 'text' ? mail.text : seenIn(mail.html);
  const ms = (time: string) => {
    const [hours, minutes, seconds] = time.split(':').map(Number) as [number, number, number];
    return Math.round((hours * 3600 + minutes * 60 + seconds) * 1000);
  };
  const times = (text.match(/\d+:\d\d:\d\d\.\d{3}/g) ?? []).map(ms);
  const rows = Array.from({ length: times.length / 6 }, (_, row) => times.slice(row * 6, row * 6 + 6));
  expect(rows).toHaveLength(3);
  for (const [onShift, ...states] of rows) expect(states.reduce((a, b) => a + b)).toBe(onShift);
  for (const column of [0, 1, 2, 3, 4, 5])
    expect(rows[0]![column]! + rows[1]![column]!).toBe(rows[2]![column]);
});

it('loads nothing and runs nothing', () => {
  const { html } = weeklyMail(makeWeekly(shifts, { causes: [...causes] }), options);
  expect(html).not.toMatch(/<(script|style|link|img|iframe|form|svg|object)\b|url\(|@import|\son\w+=/i);
  expect(html.match(/(?:src|href)="[^"]*"/g)).toEqual([
    'href="https://board.pennywort.example/weekly?week=2026-W40"',
  ]);
});

it('names are escaped in HTML, and stay on their line', () => {
  const crewName = '<script>alert("x")</script> & \r\nSons\u0000\'';
  const weekly = makeWeekly([{ ...shifts[0]!, crewName }], { firmName: 'Pennywort\r\nBcc: all <b>' });
  const { subject, text, html } = weeklyMail(weekly, options);
  expect(html).not.toContain('<script');
  expect(html).not.toContain('<b>');
  expect(html).toContain('&lt;script&gt;alert(&quot;x&quot;)&lt;/script&gt; &amp; Sons &#39;');
  expect(subject).not.toMatch(/[\r\n]/);
  expect(text).toContain('<script>alert("x")</script> & Sons \': ');
});

it('a week without a shift says so, and shows no share of nothing', () => {
  const weekly = makeWeekly([], { fourBefore: { onShiftMs: 0, fixedMs: 0 } });
  const { subject, text, html } = weeklyMail(weekly, options);
  expect(subject).toBe('Week 40: no shift was worked - Pennywort Surveys');
  expect(text).toContain('Fix uptime: no data');
  expect(text).toContain('Time to regain: no data');
  expect(text).toContain('Paid time without a fix: no data');
  expect(`${text} ${seenIn(html)}`).not.toMatch(/\d %|NaN|null|undefined/);
});

it('a state that there was is not told as 0, one that is nearly all not as 100', () => {
  const { text } = weeklyMail(
    makeWeekly([{ crewName: 'Alder', totals: { fixedMs: 40 * HOUR, floatMs: 1000 } }]),
    options,
  );
  expect(text).toContain('fixed 99.9 %, float 0.1 %, code only 0.0 %');
});

it('without money there is none in it; a crew without a rate makes the cost unknown, not zero', () => {
  const poor = weeklyMail(makeWeekly(shifts, {}, false), { ...options, withMoney: false });
  expect(`${poor.text} ${poor.html}`).not.toMatch(/cost|AUD/i);
  const unknown = weeklyMail(makeWeekly([{ ...shifts[0]!, hourlyRate: null }]), options);
  expect(unknown.text).toContain('Its cost: not known: a crew has no hourly rate');
});

it('200 crews make a mail that mail programs do not cut off, and still add up', () => {
  const many = Array.from({ length: 200 }, (_, index): TestShift => ({
    crewName: `Crew ${index}`,
    totals: { fixedMs: 7 * HOUR + index * 1000, floatMs: HOUR },
  }));
  const { text, html } = weeklyMail(makeWeekly(many), options);
  expect(Buffer.byteLength(html)).toBeLessThan(100_000);
  expect(text).toContain('180 other crews together');
  expect(text).toMatch(/All crews +1605:31:40 +1405:31:40 +200:00:00/);
});
