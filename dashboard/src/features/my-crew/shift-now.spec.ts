import type { Shift } from '@hubtack/contracts/shifts/shift.js';
import { describe, expect, it } from 'vitest';
import { shiftNow, stepsFrom, type ShiftNow, type WaitingStep } from './shift-now';

const shift = (change: Partial<Shift> = {}): Shift => ({
  id: 1,
  crewId: 1,
  start: 100,
  end: null,
  startedBy: null,
  endedBy: null,
  pauses: [],
  ...change,
});
const lunch = { start: 200, end: null, reason: 'lunch' as const, by: null };
const none = { shifts: [shift({ end: 500 })] };
const running = { shifts: [shift()] };
const paused = { shifts: [shift({ pauses: [lunch] })] };
const step = (step: WaitingStep['step']): WaitingStep => ({ step, at: 300, reason: null });

describe('how the shift stands', () => {
  it.each([
    ['nothing known', undefined, { kind: 'none' }],
    ['finished', none, { kind: 'none' }],
    ['open', running, { kind: 'running', since: 100 }],
    [
      'a pause that has ended',
      { shifts: [shift({ pauses: [{ ...lunch, end: 250 }] })] },
      { kind: 'running', since: 100 },
    ],
    ['a pause that has not', paused, { kind: 'paused', since: 200, reason: 'lunch' }],
    [
      'the second shift of a day counts',
      { shifts: [shift({ end: 500 }), shift({ start: 600 })] },
      { kind: 'running', since: 600 },
    ],
  ])('%s', (_, day, expected) => {
    expect(shiftNow(day, [])).toEqual(expected);
  });

  const days = { none, running, paused };
  it.each<[keyof typeof days, WaitingStep['step'], ShiftNow['kind']]>([
    ['none', 'start', 'running'],
    ['none', 'pause', 'none'],
    ['none', 'resume', 'none'],
    ['none', 'finish', 'none'],
    ['running', 'start', 'running'],
    ['running', 'pause', 'paused'],
    ['running', 'resume', 'running'],
    ['running', 'finish', 'none'],
    ['paused', 'start', 'paused'],
    ['paused', 'pause', 'paused'],
    ['paused', 'resume', 'running'],
    ['paused', 'finish', 'none'],
  ])('%s, and "%s" waits to be sent: %s', (from, waiting, expected) => {
    expect(shiftNow(days[from], [step(waiting)]).kind).toBe(expected);
  });

  it('several that wait count one after another, with their own times', () => {
    const now = shiftNow(none, [step('start'), { step: 'pause', at: 400, reason: 'driving' }]);
    expect(now).toEqual({ kind: 'paused', since: 400, reason: 'driving' });
  });
});

it('every step on offer leads somewhere else', () => {
  const days = { none, running, paused };
  for (const kind of ['none', 'running', 'paused'] as const)
    for (const offered of stepsFrom[kind]) expect(shiftNow(days[kind], [step(offered)]).kind).not.toBe(kind);
});
