import type { CheckStep } from '@hubtack/contracts/corrections/check.js';
import { describe, expect, it } from 'vitest';
import { announcement, asSentence, markOf, sourceVerdict, verdictOf } from './check-words';

const at = '2026-12-01T22:12:00Z';
const timeOf = () => 'at 09:12';
const last = (change: object) => ({
  downSince: null,
  lastCheck: { id: 1, at, status: 'done' as const, passed: true, failedStep: null, ...change },
});

describe('what is said of a source', () => {
  it.each([
    [{ downSince: null, lastCheck: null }, 'never checked'],
    [last({}), 'passed at 09:12'],
    [last({ passed: false, failedStep: 'mountPoint' }), 'failed at “Mount point there” at 09:12'],
    [last({ status: 'cancelled', passed: null }), 'cancelled at 09:12'],
    [last({ status: 'running', passed: null }), 'being checked now'],
    [
      { ...last({ passed: false, failedStep: 'data' }), downSince: at },
      'down since 09:12, failed at “Data arriving”',
    ],
    // Checked again while it is down.
    [{ ...last({ status: 'running', passed: null }), downSince: at }, 'being checked now'],
  ])('%j', (source, words) => {
    expect(sourceVerdict(source, timeOf).words).toBe(words);
  });
});

const step = (
  name: CheckStep['step'],
  outcome: CheckStep['outcome'],
  warnings: string[] = [],
): CheckStep => ({
  step: name,
  outcome,
  seen: '',
  toTry: null,
  warnings,
  durationMs: null,
});

describe('what is said aloud', () => {
  const steps = [step('address', 'pass'), step('connection', 'fail'), step('sourceTable', 'skipped')];
  it('while it runs: the step that ended last', () => {
    const check = { status: 'running' as const, passed: null, failedStep: null };
    expect(announcement({ ...check, steps: steps.slice(0, 1) })).toBe('Address found: passed.');
    expect(announcement({ ...check, steps: [step('address', 'running')] })).toBe('');
  });
  it('at the end: how it came out', () => {
    const check = { status: 'done' as const, passed: false, failedStep: 'connection' as const, steps };
    expect(announcement(check)).toBe('Connected: failed. The check failed at “Connected”.');
  });
  it('a cancelled check says so', () => {
    const check = { status: 'cancelled' as const, passed: null, failedStep: null };
    expect(verdictOf(check)).toEqual({ mark: 'skipped', words: 'cancelled' });
    expect(announcement({ ...check, steps: [] })).toBe('The check was cancelled.');
  });
});

it('warnings are sentences, however they come', () => {
  expect(asSentence('26 frames were dropped')).toBe('26 frames were dropped.');
  expect(asSentence('is it a nought?')).toBe('Is it a nought?');
});

it('a pass with something odd about it does not look like any other', () => {
  expect(markOf(step('sourceTable', 'pass', ['no end']))).toBe('warned');
  expect(markOf(step('sourceTable', 'fail', ['no end']))).toBe('fail');
});
