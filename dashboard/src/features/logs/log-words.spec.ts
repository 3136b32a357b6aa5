import type { LogDetail, LogSummary } from '@hubtack/contracts/logs/log.js';
import { describe, expect, it } from 'vitest';
import { countRows, logSentence, size } from './log-words';

const summary = (change: Partial<LogSummary> = {}): LogSummary => ({
  sentences: 120,
  ggaSentences: 100,
  badChecksum: 0,
  malformed: 0,
  ignored: 20,
  untimed: 0,
  epochs: 100,
  duplicates: 0,
  firstTime: '2026-12-01T00:00:00Z',
  lastTime: '2026-12-01T01:00:00Z',
  totals: { fixedMs: 2_700_000, floatMs: 900_000, codeMs: 0, noneMs: 0, silentMs: 0 },
  transitions: [],
  moreTransitions: 0,
  medianSatellites: 20,
  maxAgeSeconds: 1.2,
  ...change,
});
const detail = (losses: LogDetail['losses'] = []): LogDetail => ({
  spans: [],
  points: [],
  losses,
  rejected: [],
  moreRejected: 0,
  dateFrom: 'sentences',
  notes: [],
  history: null,
});
const loss = (minutes: number, cause: LogDetail['losses'][number]['cause']) => ({
  start: '2026-12-01T00:10:00Z',
  end: new Date(Date.parse('2026-12-01T00:10:00Z') + minutes * 60_000).toISOString(),
  cause,
  evidence: [],
});

describe('a log in a sentence', () => {
  it('says how much of it was fixed, and what its longest loss was', () => {
    expect(logSentence(summary(), detail())).toBe('1 h 0 min, 75.0 % fixed. No loss of the fix that counts.');
    expect(logSentence(summary(), detail([loss(2, 'skyBlocked')]))).toBe(
      '1 h 0 min, 75.0 % fixed. One loss, of 2 min 0 s: sky blocked.',
    );
    expect(logSentence(summary(), detail([loss(2, 'skyBlocked'), loss(12, 'correctionsStopped')]))).toBe(
      '1 h 0 min, 75.0 % fixed. Two losses, the longest 12 min: corrections stopped on this rover.',
    );
  });
  it('a loss that goes on is as long as the log lets it be', () => {
    expect(logSentence(summary(), detail([{ ...loss(2, 'skyBlocked'), end: null }]))).toMatch(
      /One loss, of 50 min: sky blocked\.$/,
    );
  });
  it('of nothing says so', () => {
    expect(logSentence(summary({ epochs: 0 }), detail())).toBe(
      'Nothing in this file says when or where a rover was.',
    );
    const single = { fixedMs: 0, floatMs: 0, codeMs: 0, noneMs: 0, silentMs: 0 };
    expect(logSentence(summary({ epochs: 1, totals: single }), detail())).toMatch(/^A single epoch\./);
  });
});
it('counts leave noughts out, but for what everybody asks', () => {
  expect(countRows(summary({ sentences: 0, ggaSentences: 0, epochs: 0, ignored: 0 }))).toEqual([
    ['Sentences', 0],
    ['Epochs', 0],
  ]);
  expect(countRows(summary({ badChecksum: 3 }))).toContainEqual(['Wrong checksum', 3]);
});
it.each([
  [120, '120 bytes'],
  [864_256, '844 kB'],
  [12_897_484, '12.3 MB'],
])('%d bytes are %s', (bytes, words) => {
  expect(size(bytes)).toBe(words);
});
