import { describe, expect, it } from 'vitest';
import { lengthWords, noticeMail, noticeText, type NoticeFacts } from './notice-words.js';

const MIN = 60_000;
const facts = (change: Partial<NoticeFacts> = {}): NoticeFacts => ({
  kind: 'lostFix',
  roverLabel: 'R-04',
  crewName: 'Dogwood',
  mountPoint: 'QUARB2',
  startAt: 0,
  pausedMs: 0,
  flagAt: null,
  flagWord: null,
  flagNote: null,
  diagnosis: {
    cause: 'skyBlocked',
    evidence: ['satellites 22 → 7', 'corrections good (age 1 s)'],
    runnerUp: null,
    at: 0,
  },
  ...change,
});
const because = (cause: NonNullable<NoticeFacts['diagnosis']>['cause'], ...evidence: string[]) => ({
  diagnosis: { cause, evidence, runnerUp: null, at: 0 },
});
const raised = (change: Partial<NoticeFacts> = {}, now = 2 * MIN) =>
  noticeText({ kind: 'raised' }, facts(change), null, now);

describe('short words, fit to be read out', () => {
  it.each([
    [{}, 'Dogwood (R-04): lost fix, 2 min. Sky blocked? Satellites 22 to 7.'],
    [{ pausedMs: 90_000 }, 'Dogwood (R-04): lost fix, 30 s. Sky blocked? Satellites 22 to 7.'],
    [{ crewName: null, diagnosis: null }, 'R-04: lost fix, 2 min. Cause unclear.'],
    [because('unclear', 'the evidence is mixed'), 'Dogwood (R-04): lost fix, 2 min. Cause unclear.'],
    [
      because('notResolving', 'float', 'corrections good (age 1 s)'),
      'Dogwood (R-04): lost fix, 2 min. Corrections and sky good, still float? Corrections good (age 1 s).',
    ],
    [
      { kind: 'noFirstFix' as const, ...because('neverCorrected', 'no base station id') },
      'Dogwood (R-04): no first fix, 2 min. No corrections since power-up? No base station id.',
    ],
    [
      because('wentQuiet', 'nothing heard for 65 s'),
      'Dogwood (R-04): lost fix, 2 min. Nothing heard for 65 s. Call the crew.',
    ],
    [
      { kind: 'notHeard' as const, ...because('notHeard', 'nothing heard since the shift began 10 min ago') },
      'Dogwood (R-04): not heard since the shift began, 2 min. Call the crew.',
    ],
    [
      {
        kind: 'mountPoint' as const,
        roverLabel: null,
        crewName: null,
        mountPoint: 'TANF00',
        ...because(
          'mountPointDown',
          '3 of 4 rovers on TANF00 lost their corrections together',
          'Alder, Echidna',
        ),
      },
      'Corrections stopped at mount point TANF00. 3 of 4 rovers on TANF00 lost their corrections together.',
    ],
  ])('%j', (change, expected) => {
    expect(raised(change)).toBe(expected);
  });

  it('a flag has the chief’s own words', () => {
    const flag = { flagAt: 0, flagWord: 'fixLooksWrong' as const, flagNote: 'Nail 12 is 80 mm off' };
    const text = noticeText({ kind: 'flag' }, facts(flag), null, 0);
    expect(text).toBe('Dogwood (R-04): flagged by the crew, fix looks wrong. Nail 12 is 80 mm off');
  });
  it('advice is what was said', () => {
    const text = noticeText({ kind: 'advice', adviceId: 1 }, facts(), 'Switch to QUARB2, 8.4 km', 0);
    expect(text).toBe('Advice for Dogwood (R-04): Switch to QUARB2, 8.4 km');
  });
  it('back from the shelf says so', () => {
    expect(noticeText({ kind: 'back', at: 0 }, facts(), null, 20 * MIN)).toBe(
      'Back from the shelf: Dogwood (R-04): lost fix, 20 min. Sky blocked? Satellites 22 to 7.',
    );
  });
});

it('a quiet rover is a reason to call, whoever says what; nothing ever calls a crew safe', () => {
  const silent = because('wentQuiet', 'nothing heard for 65 s');
  const flag = { ...silent, flagAt: 0, flagWord: 'somethingElse' as const };
  const told = [
    raised(silent),
    raised({ kind: 'notHeard', diagnosis: null }),
    noticeText({ kind: 'flag' }, facts(flag), null, 0),
    noticeText({ kind: 'back', at: 0 }, facts(silent), null, 0),
    noticeMail('x@pennywort.example', raised(silent), facts(silent), 'http://board').text,
  ];
  for (const text of told) {
    expect(text).toContain('Call the crew.');
    expect(text).not.toMatch(/\b(is|are) (safe|well|fine|ok)\b/i);
  }
});

it('a mail has the first sentence as its subject, and what to try first', () => {
  const mail = noticeMail('d@pennywort.example', raised({}, 10 * MIN), facts(), 'http://board.example');
  expect(mail).toMatchObject({ to: 'd@pennywort.example', subject: 'Dogwood (R-04): lost fix, 10 min' });
  expect(mail.text).toContain('First thing to try: Move into the open');
  expect(mail.text).toContain('http://board.example');
});

it.each([
  [-5, '0 s'],
  [59_999, '59 s'],
  [MIN, '1 min'],
  [60 * MIN - 1, '59 min'],
  [125 * MIN, '2 h 5 min'],
])('%d ms are %s', (ms, words) => {
  expect(lengthWords(ms)).toBe(words);
});
